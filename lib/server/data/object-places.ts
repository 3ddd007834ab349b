import 'server-only';
import type { ObjectName } from '@/lib/contracts/api/object-name';
import { starKey } from '@/lib/contracts/star-name';
import type { Scope } from '@/lib/server/policy/scope';
import { select, type Tx } from './database';

export interface ProgrammeRow {
  readonly id: number;
  readonly code: string;
  readonly archivedAt: Date | null;
}

/** Programmes by their codes, in any case of letters. */
export async function programmesByCode(
  codes: readonly string[],
  tx: Tx | null = null,
): Promise<ReadonlyMap<string, ProgrammeRow>> {
  if (codes.length === 0) return new Map();
  const rows = await select<ProgrammeRow>(
    'SELECT id, code, archived_at AS archivedAt FROM programmes WHERE code IN (:codes)',
    { codes },
    tx,
  );
  return new Map(rows.map((row) => [row.code.toLowerCase(), row]));
}

export interface TargetRow {
  readonly programmeId: number;
  readonly programme: string;
  readonly isArchived: boolean;
  readonly nameKey: string;
  readonly name: string;
  /** [deg] J2000 */
  readonly ra: number;
  /** [deg] J2000 */
  readonly decl: number;
}

/** Targets of any programme whose names have one of the keys. */
export async function targetsByKey(
  keys: readonly string[],
  tx: Tx | null = null,
): Promise<readonly TargetRow[]> {
  if (keys.length === 0) return [];
  const rows = await select<Omit<TargetRow, 'isArchived'> & { isArchived: number }>(
    `SELECT r.programme_id AS programmeId, g.code AS programme, g.archived_at IS NOT NULL AS isArchived,
            r.name_key AS nameKey, r.name, r.ra, r.decl
       FROM programme_targets r JOIN programmes g ON g.id = r.programme_id
      WHERE r.name_key IN (:keys)`,
    { keys },
    tx,
  );
  return rows.map((row) => ({ ...row, isArchived: row.isArchived === 1 }));
}

export interface FieldRow {
  readonly field: string;
  /** Of the mean direction of its usable stars: right also across 0 h and at the poles. [deg] J2000 */
  readonly ra: number;
  readonly decl: number;
}

const centre = `MOD(DEGREES(ATAN2(AVG(COS(RADIANS(decl)) * SIN(RADIANS(ra))), AVG(COS(RADIANS(decl)) * COS(RADIANS(ra))))) + 360, 360) AS ra,
  DEGREES(ATAN2(AVG(SIN(RADIANS(decl))),
    SQRT(POW(AVG(COS(RADIANS(decl)) * COS(RADIANS(ra))), 2) + POW(AVG(COS(RADIANS(decl)) * SIN(RADIANS(ra))), 2)))) AS decl`;

/** Every standard field with its centre. A few hundred rows: names are matched here, by key. */
export async function standardFields(tx: Tx | null = null): Promise<readonly FieldRow[]> {
  return select<FieldRow>(
    `SELECT field, ${centre} FROM standard_stars WHERE is_usable GROUP BY field ORDER BY field`,
    {},
    tx,
  );
}

export interface StarRow {
  readonly nameKey: string;
  readonly field: string;
  readonly ra: number;
  readonly decl: number;
}

/** Standard stars whose names have one of the keys. */
export async function standardStarsByKey(
  keys: readonly string[],
  tx: Tx | null = null,
): Promise<readonly StarRow[]> {
  if (keys.length === 0) return [];
  return select<StarRow>(
    'SELECT name_key AS nameKey, field, ra, decl FROM standard_stars WHERE name_key IN (:keys)',
    { keys },
    tx,
  );
}

/** Names that a frame's object can have: targets of the programmes in the scope, and standard fields. */
export async function objectNames(scope: Scope): Promise<readonly ObjectName[]> {
  const targets = await select<{ name: string; programme: string; ra: number; decl: number }>(
    `SELECT r.name, g.code AS programme, r.ra, r.decl
       FROM programme_targets r JOIN programmes g ON g.id = r.programme_id
      WHERE g.archived_at IS NULL AND (:all OR g.id IN (:programmes))
      ORDER BY r.name, g.code`,
    { all: scope.all, programmes: scope.programmeIds.length === 0 ? [0] : scope.programmeIds },
  );
  const fields = await standardFields();
  return [
    ...targets.map(({ name, programme, ra, decl }): ObjectName => ({
      name,
      kind: 'target',
      programme,
      ra,
      dec: decl,
    })),
    ...fields.map(({ field, ra, decl }): ObjectName => ({
      name: field,
      kind: 'standard field',
      programme: null,
      ra,
      dec: decl,
    })),
  ];
}

/** Whether a name holds the text, as people type names. */
export const nameHolds = (name: string, text: string): boolean => starKey(name).includes(starKey(text));
