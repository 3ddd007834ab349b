import 'server-only';
import type { CheckResult, LoadPlan, Slice } from '@/lib/contracts/measurement-check';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { checkFrames, type CheckFrame } from '@/lib/server/data/check-inputs';
import { photometrists } from '@/lib/server/data/check-notices';
import { createFrames } from '@/lib/server/data/created-frames';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import {
  insertSetFrames,
  loadRowSlice,
  loadStarsAndFlags,
  unloadMeasurements,
} from '@/lib/server/data/measurement-loads';
import { moveSet, requireSet, type MeasurementSetRow } from '@/lib/server/data/measurement-sets';
import { demandLease } from '@/lib/server/jobs/lease';
import { nightWords, setLink } from '@/lib/server/mail/measurement-words';
import { measurementsWaitingMail } from '@/lib/server/mail/measurements-waiting';
import { postMail } from '@/lib/server/mail/post-mail';
import type { JobCaller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';

export interface TableLoad {
  /** Slices of rows as the check fills them. */
  readonly slices: AsyncIterable<Slice>;
  /** What the check came to, once it has; the set is `checked` by then, unless there were faults. */
  readonly result: Promise<CheckResult>;
  /** The frames as the check saw them. */
  readonly seen: readonly CheckFrame[];
  /** Told after every statement with the rows that are in so far; what it throws undoes all of it. */
  readonly onRows: (rows: number) => void;
}

/**
 * Loads a table while it is being checked: its rows, stars, flags and new frames, the state and the news of it, all in
 * one transaction. Faults of the table undo it and are returned. When a frame that the rows name has changed since the
 * check began, nothing happens either and the fault is `stale`: check again.
 */
export async function loadMeasurements(caller: JobCaller, id: string, load: TableLoad): Promise<CheckResult> {
  const refused = new Fault('unprocessable', 'The table has faults.');
  try {
    return await inTransaction(async (tx) => {
      const set = await requireSet(dataScope(caller), id, tx);
      await unloadMeasurements(tx, set.id);
      const rows = await loadEarly(tx, set, load);
      const result = await load.result;
      if (result.load === null) throw refused;
      await loadRest(tx, set, { ...load, plan: result.load, rows });
      await settle(tx, caller, set, { result, plan: result.load });
      return result;
    });
  } catch (error) {
    // Thrown above to undo the rows that were loaded before the first fault was found.
    if (error === refused) return load.result;
    throw error;
  }
}

async function loadEarly(tx: Tx, set: MeasurementSetRow, { slices, onRows }: TableLoad): Promise<number> {
  let rows = 0;
  for await (const slice of slices) {
    await loadRowSlice(tx, { setId: set.id, slice, created: [] });
    rows += slice.rows;
    onRows(rows);
  }
  return rows;
}

interface Rest extends TableLoad {
  readonly plan: LoadPlan;
  /** Loaded so far. */
  readonly rows: number;
}

async function loadRest(tx: Tx, set: MeasurementSetRow, { plan, onRows, ...rest }: Rest): Promise<void> {
  const created = await createFrames(tx, set, plan.newFrames);
  let { rows } = rest;
  for (const slice of plan.slices) {
    await loadRowSlice(tx, { setId: set.id, slice, created });
    rows += slice.rows;
    onRows(rows);
  }
  await loadStarsAndFlags(tx, set.id, plan);
  const used = plan.usedFrames.map(({ frame, rows: count }) => ({
    frame: frame > 0 ? frame : (created[-frame - 1] ?? 0),
    rows: count,
  }));
  await insertSetFrames(tx, set.id, used);
  await demandSameFrames(tx, set, { plan, seen: rest.seen });
}

interface Matched {
  readonly result: CheckResult;
  readonly plan: LoadPlan;
}

async function settle(
  tx: Tx,
  caller: JobCaller,
  set: MeasurementSetRow,
  { result, plan }: Matched,
): Promise<void> {
  const framesCreated = plan.newFrames.length;
  await moveSet(tx, set, {
    from: ['checked'],
    to: 'matched',
    set: { n_rows: result.rows, n_matched: plan.matchedRows, n_frames_created: framesCreated, n_faults: 0 },
  });
  await recordAudit(tx, caller, {
    act: 'measurements.check',
    subjectKind: 'measurement-set',
    subjectId: set.publicId,
    nightId: set.nightId,
    before: { state: set.state },
    after: { state: 'matched', rows: result.rows, matchedRows: plan.matchedRows, framesCreated },
  });
  await tellPhotometrists(tx, set, { result, plan });
  await demandLease(tx, caller);
}

/** The rows were matched to frames as they were; a frame that was corrected since could make them wrong. */
async function demandSameFrames(
  tx: Tx,
  set: MeasurementSetRow,
  { plan, seen }: Pick<Rest, 'plan' | 'seen'>,
): Promise<void> {
  const used = new Set(plan.usedFrames.map(({ frame }) => frame));
  const words = (frames: readonly CheckFrame[]): string =>
    JSON.stringify(frames.filter(({ id }) => used.has(id)));
  if (words(await checkFrames(set.nightId, tx, true)) === words(seen)) return;
  throw new Fault('stale', 'A frame was changed in the log while the table was being checked.');
}

async function tellPhotometrists(tx: Tx, set: MeasurementSetRow, { result, plan }: Matched): Promise<void> {
  for (const person of await photometrists(tx)) {
    const mail = measurementsWaitingMail({
      name: person.name,
      night: nightWords(set),
      set: set.name,
      uploadedBy: set.uploadedBy,
      nRows: result.rows,
      nMatched: plan.matchedRows,
      href: setLink(set),
    });
    await postMail(tx, {
      ...mail,
      dedupeKey: `measurements-waiting:${set.publicId}:${person.personId}`,
      to: person,
    });
  }
}
