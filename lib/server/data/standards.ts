import 'server-only';
import type { StandardStar } from '@/lib/contracts/standard-star';
import { select, type SqlValues, type Tx } from './database';

export interface StandardRow extends StandardStar {
  readonly id: number;
  readonly nameKey: string;
  readonly field: string;
}

export interface StandardFilter {
  readonly field?: string | undefined;
  /** Part of the key of the name. */
  readonly nameKey?: string | undefined;
  /** Declinations, both included [deg]. */
  readonly band?: { readonly from: number; readonly to: number } | undefined;
}

const columns = `s.id, s.name, s.name_key AS nameKey, s.field, s.ra, s.decl AS \`dec\`, s.pm_ra AS pmRa, s.pm_dec AS pmDec,
  s.v, s.bv, s.ub, s.vr, s.ri, COALESCE(s.vi, s.vr + s.ri) AS vi,
  s.e_v AS eV, s.e_bv AS eBv, s.e_ub AS eUb, s.e_vr AS eVr, s.e_ri AS eRi, s.e_vi AS eVi,
  s.n_observations AS nObservations, s.is_usable AS isUsable, s.caution,
  o.citation AS source, o.default_error AS defaultError`;

/** Everything but these is taken literally in a LIKE pattern. */
const literal = (text: string): string => text.replace(/[\\%_]/g, (sign) => `\\${sign}`);

/** Standard stars in the order of right ascension. They are everybody's to see, so the list needs no scope. */
export async function standards(
  filter: StandardFilter = {},
  tx: Tx | null = null,
): Promise<readonly StandardRow[]> {
  const { field, nameKey, band } = filter;
  const conditions = [
    'TRUE',
    field === undefined ? '' : 's.field = :field',
    nameKey === undefined ? '' : 's.name_key LIKE :nameKey',
    band === undefined ? '' : 's.decl BETWEEN :from AND :to',
  ].filter((sql) => sql !== '');
  const values: SqlValues = {
    field: field ?? null,
    nameKey: nameKey === undefined ? null : `%${literal(nameKey)}%`,
    from: band?.from ?? null,
    to: band?.to ?? null,
  };
  const rows = await select<Omit<StandardRow, 'isUsable'> & { readonly isUsable: number }>(
    `SELECT ${columns} FROM standard_stars s JOIN standard_sources o ON o.id = s.source_id
      WHERE ${conditions.join(' AND ')} ORDER BY s.ra, s.name`,
    values,
    tx,
  );
  return rows.map((row) => ({ ...row, isUsable: row.isUsable === 1 }));
}

/** Names of all fields that have standard stars. */
export async function standardFieldNames(): Promise<readonly string[]> {
  const rows = await select<{ field: string }>('SELECT DISTINCT field FROM standard_stars ORDER BY field');
  return rows.map(({ field }) => field);
}

export interface StandardSourceRow {
  readonly citation: string;
  readonly note: string;
  readonly defaultError: number;
  readonly nStars: number;
}

/** Publications that the standard stars come from. */
export async function standardSources(): Promise<readonly StandardSourceRow[]> {
  return select<StandardSourceRow>(
    `SELECT o.citation, o.note, o.default_error AS defaultError, COUNT(s.id) AS nStars
       FROM standard_sources o LEFT JOIN standard_stars s ON s.source_id = o.id GROUP BY o.id ORDER BY o.id`,
  );
}
