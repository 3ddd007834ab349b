import 'server-only';
import type { CheckResult, LoadPlan } from '@/lib/contracts/measurement-check';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { checkFrames, type CheckFrame } from '@/lib/server/data/check-inputs';
import { photometrists } from '@/lib/server/data/check-notices';
import { createFrames } from '@/lib/server/data/created-frames';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { insertSetFrames, loadMeasurements, unloadMeasurements } from '@/lib/server/data/measurement-loads';
import { lockSet, moveSet, requireSet, type MeasurementSetRow } from '@/lib/server/data/measurement-sets';
import { demandLease } from '@/lib/server/jobs/lease';
import { nightWords, setLink } from '@/lib/server/mail/measurement-words';
import { measurementsWaitingMail } from '@/lib/server/mail/measurements-waiting';
import { postMail } from '@/lib/server/mail/post-mail';
import type { JobCaller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';

export interface MatchedSet {
  readonly result: CheckResult;
  readonly plan: LoadPlan;
  /** The frames as the check saw them. */
  readonly seen: readonly CheckFrame[];
  /** Told after every statement with the rows that are in so far; what it throws undoes all of it. */
  readonly onRows: (rows: number) => void;
}

/**
 * Loads a checked table: its rows, stars, flags and new frames, the state and the news of it, in one transaction. When a
 * frame that the rows name has changed since the check, nothing happens and the fault is `stale`: check again.
 */
export async function recordMatchedSet(caller: JobCaller, id: string, matched: MatchedSet): Promise<void> {
  const { result, plan } = matched;
  await inTransaction(async (tx) => {
    const set = await requireSet(dataScope(caller), id, tx);
    if ((await lockSet(tx, set.id)) !== 'checked')
      throw new Fault('conflict', `The set “${set.name}” is not checked.`);
    await unloadMeasurements(tx, set.id);
    const created = await createFrames(tx, set, plan.newFrames);
    await loadMeasurements(tx, { setId: set.id, files: plan, created }, matched.onRows);
    const used = plan.usedFrames.map(({ frame, rows }) => ({
      frame: frame > 0 ? frame : (created[-frame - 1] ?? 0),
      rows,
    }));
    await insertSetFrames(tx, set.id, used);
    await demandSameFrames(tx, set, matched);
    await moveSet(tx, set, {
      from: ['checked'],
      to: 'matched',
      set: {
        n_rows: result.rows,
        n_matched: plan.matchedRows,
        n_frames_created: created.length,
        n_faults: 0,
      },
    });
    await recordAudit(tx, caller, {
      act: 'measurements.check',
      subjectKind: 'measurement-set',
      subjectId: set.publicId,
      nightId: set.nightId,
      before: { state: set.state },
      after: {
        state: 'matched',
        rows: result.rows,
        matchedRows: plan.matchedRows,
        framesCreated: created.length,
      },
    });
    await tellPhotometrists(tx, set, matched);
    await demandLease(tx, caller);
  });
}

/** The rows were matched to frames as they were; a frame that was corrected since could make them wrong. */
async function demandSameFrames(tx: Tx, set: MeasurementSetRow, { plan, seen }: MatchedSet): Promise<void> {
  const used = new Set(plan.usedFrames.map(({ frame }) => frame));
  const words = (frames: readonly CheckFrame[]): string =>
    JSON.stringify(frames.filter(({ id }) => used.has(id)));
  if (words(await checkFrames(set.nightId, tx, true)) === words(seen)) return;
  throw new Fault('stale', 'A frame was changed in the log while the table was being checked.');
}

async function tellPhotometrists(
  tx: Tx,
  set: MeasurementSetRow,
  { result, plan }: MatchedSet,
): Promise<void> {
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
