import 'server-only';
import type { Band } from '@/lib/contracts/bands';
import { select, selectOne, type Tx } from './database';

export interface FilterRow {
  readonly band: Band;
  readonly name: string;
  /** [s] */
  readonly defaultExposure: number | null;
}

/** A telescope with what the log must know of it: where it stands, how low it points, which bands it has. */
export interface InstrumentRow {
  readonly id: number;
  readonly code: string;
  readonly name: string;
  /** [deg] */
  readonly minAltitude: number;
  readonly retiredOn: string | null;
  readonly siteName: string;
  /** [deg], east positive */
  readonly longitude: number;
  /** [deg] */
  readonly latitude: number;
  /** [m] */
  readonly elevation: number;
  readonly timezone: string;
  readonly filters: readonly FilterRow[];
}

const columns = `t.id, t.code, t.name, t.min_altitude AS minAltitude, DATE_FORMAT(t.retired_on, '%Y-%m-%d') AS retiredOn,
  s.name AS siteName, s.longitude, s.latitude, s.elevation, s.timezone`;

async function find(
  where: string,
  values: Readonly<Record<string, string | number>>,
  tx: Tx | null,
): Promise<InstrumentRow | null> {
  const row = await selectOne<Omit<InstrumentRow, 'filters'>>(
    `SELECT ${columns} FROM telescopes t JOIN sites s ON s.id = t.site_id WHERE ${where}`,
    values,
    tx,
  );
  if (!row) return null;
  const filters = await select<FilterRow>(
    `SELECT band, name, default_exposure AS defaultExposure FROM filters
      WHERE telescope_id = :id ORDER BY FIELD(band, 'U', 'B', 'V', 'R', 'I')`,
    { id: row.id },
    tx,
  );
  return { ...row, filters };
}

export const instrumentByCode = (code: string, tx: Tx | null = null): Promise<InstrumentRow | null> =>
  find('t.code = :code', { code }, tx);

/** The telescope of a night: the foreign key says that it is there. */
export async function instrumentOf(
  night: { readonly telescopeId: number },
  tx: Tx | null = null,
): Promise<InstrumentRow> {
  const found = await find('t.id = :id', { id: night.telescopeId }, tx);
  if (!found) throw new Error(`The telescope ${night.telescopeId} is gone from under its night.`);
  return found;
}

/** Locks the telescope's row, so that two people cannot open its same night. */
export async function lockInstrument(tx: Tx, telescopeId: number): Promise<void> {
  await select('SELECT id FROM telescopes WHERE id = :telescopeId FOR UPDATE', { telescopeId }, tx);
}
