import 'server-only';
import { database } from '@/db/connection';
import type { LoadPlan, Slice } from '@/lib/contracts/measurement-check';
import type { Issue } from '@/lib/faults/fault';
import { execute, type Tx } from './database';
import { loadRows } from './load-rows';

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

export interface SliceLoad {
  readonly setId: number;
  readonly slice: Slice;
  /** Ids of the frames that the file calls −1, −2, … */
  readonly created: readonly number[];
}

/** Loads a slice of a set's rows. */
export async function loadRowSlice(tx: Tx, { setId, slice, created }: SliceLoad): Promise<void> {
  const frame =
    created.length === 0 ? '@frame' : `IF(@frame > 0, @frame, ELT(-@frame, ${created.join(', ')}))`;
  await loadRows(tx, {
    ...slice,
    table: 'measurements',
    columns: [...rowColumns, ...keptColumns],
    set: { set_id: String(setId), frame_id: frame },
  });
}

/** Loads the stars and flags that a set's rows name by number. */
export async function loadStarsAndFlags(
  tx: Tx,
  setId: number,
  plan: Pick<LoadPlan, 'stars' | 'flags'>,
): Promise<void> {
  const set = { set_id: String(setId) };
  for (const slice of plan.flags) {
    await loadRows(tx, { ...slice, table: 'measurement_flags', columns: ['flag_no', 'text'], set });
  }
  for (const slice of plan.stars) {
    await loadRows(tx, { ...slice, table: 'measurement_stars', columns: starColumns, set });
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
