import 'server-only';
import { database } from '@/db/connection';
import type { Issue } from '@/lib/faults/fault';
import { execute, type Tx } from './database';
import { loadRows } from './load-rows';

/** Files that a check has written, in the order of the tables' columns. */
export interface LoadFiles {
  readonly slices: readonly { readonly file: string; readonly rows: number }[];
  readonly stars: { readonly file: string; readonly rows: number };
  readonly flags: { readonly file: string; readonly rows: number };
}

const rowColumns = ['row_no', '@frame', 'star_no', 'inst_mag', 'inst_err', 'ra', 'decl'];
const keptColumns = ['x', 'y', 'fwhm', 'sky', 'peak', 'flag_no'];
const starColumns = [
  'star_no',
  'name',
  'ra',
  'decl',
  'n_rows',
  'first_line',
  'standard_id',
  'matched_by',
  'separation',
  'reason',
];

/** Loads the rows, stars and flags of a set. In the files a frame that was just created stands as −1, −2, …, for the first, second, … of `created`. */
export async function loadMeasurements(
  tx: Tx,
  load: { readonly setId: number; readonly files: LoadFiles; readonly created: readonly number[] },
  onSlice: (rows: number) => void,
): Promise<void> {
  const { setId, files, created } = load;
  const set = { set_id: String(setId) };
  if (files.flags.rows > 0) {
    await loadRows(tx, { ...files.flags, table: 'measurement_flags', columns: ['flag_no', 'text'], set });
  }
  await loadRows(tx, { ...files.stars, table: 'measurement_stars', columns: starColumns, set });
  const frame =
    created.length === 0 ? '@frame' : `IF(@frame > 0, @frame, ELT(-@frame, ${created.join(', ')}))`;
  let rows = 0;
  for (const slice of files.slices) {
    const columns = [...rowColumns, ...keptColumns];
    await loadRows(tx, { ...slice, table: 'measurements', columns, set: { ...set, frame_id: frame } });
    rows += slice.rows;
    onSlice(rows);
  }
}

export async function insertSetFrames(
  tx: Tx,
  setId: number,
  frames: readonly { readonly frame: number; readonly rows: number }[],
): Promise<void> {
  await database()
    .getQueryInterface()
    .bulkInsert(
      'measurement_set_frames',
      frames.map(({ frame, rows }) => ({ set_id: setId, frame_id: frame, n_rows: rows })),
      { transaction: tx },
    );
}

/** Removes whatever is loaded of a set. */
export async function unloadMeasurements(tx: Tx, setId: number): Promise<void> {
  for (const table of ['measurements', 'measurement_stars', 'measurement_flags', 'measurement_set_frames']) {
    await execute(`DELETE FROM ${table} WHERE set_id = :setId`, { setId }, tx);
  }
}

/** Puts these faults in the place of any that the set had. */
export async function replaceFaults(tx: Tx, setId: number, faults: readonly Issue[]): Promise<void> {
  await execute('DELETE FROM measurement_faults WHERE set_id = :setId', { setId }, tx);
  if (faults.length === 0) return;
  const rows = faults.map((fault, index) => ({
    set_id: setId,
    seq: index + 1,
    line: fault.line ?? null,
    column_name: fault.column?.slice(0, 120) ?? null,
    value: fault.value?.slice(0, 200) ?? null,
    message: fault.message.slice(0, 500),
    remedy: (fault.remedy ?? '').slice(0, 500),
  }));
  await database().getQueryInterface().bulkInsert('measurement_faults', rows, { transaction: tx });
}
