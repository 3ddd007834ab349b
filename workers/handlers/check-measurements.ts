import { Worker } from 'node:worker_threads';
import type { CheckResult, LoadPlan } from '@/lib/contracts/measurement-check';
import { Fault, isFault } from '@/lib/faults/fault';
import { markSetChecked } from '@/lib/server/acts/mark-set-checked';
import { recordMatchedSet } from '@/lib/server/acts/record-matched-set';
import { recordRefusedSet } from '@/lib/server/acts/record-refused-set';
import type { JobResult } from '@/lib/server/jobs/kinds';
import { checkInputs, type CheckInputs } from '@/lib/server/reads/check-inputs';
import { originalPath } from '@/lib/server/storage/originals';
import { withWorkFolder } from '@/lib/server/storage/work-folders';
import type { Handler, JobRun } from '../handler';
import type { CheckMessage, CheckOrder } from '../threads/check-measurements/messages';
import { followThread, startThread } from '../threads/start-thread';
import { checkOrder } from './check-order';

type Run = JobRun<'check-measurements'>;
type Result = JobResult<'check-measurements'>;

/** The log may be corrected while a table is being checked; so often the check begins anew before it waits its turn again. */
const mostAttempts = 3;
/** Parts of the whole that reading and matching take; loading takes the rest. Measured with a million rows. */
const share = { reading: 0.5, matching: 0.55 } as const;

const figure = (rows: number): string => rows.toLocaleString('en-GB');

/**
 * Checks an uploaded table in a thread, which leaves the rows in files; loads them in one transaction, or refuses the
 * table with all its faults. Run again at any time it comes to the same end.
 */
export const checkMeasurements: Handler<'check-measurements'> = async (run) => {
  for (let attempt = 1; ; attempt += 1) {
    const inputs = await checkInputs(run.caller, run.payload.set);
    const ended = endedResult(inputs);
    if (ended) return ended;
    try {
      return await withWorkFolder(run.id, (folder) => check(run, inputs, folder));
    } catch (error) {
      // The log has changed meanwhile: what was found may no longer hold.
      if (!isFault(error, 'stale')) throw error;
      if (attempt < mostAttempts) continue;
      throw new Fault('unavailable', 'The log kept changing while the table was being checked.', {
        cause: error,
      });
    }
  }
};

/** The result of a set that an earlier run brought to its end. */
function endedResult({ set }: CheckInputs): Result | null {
  if (set.state === 'received' || set.state === 'checked') return null;
  return {
    set: set.publicId,
    state: set.state === 'refused' ? 'refused' : 'matched',
    rows: set.nRows ?? 0,
    matched: set.nMatched ?? 0,
    faults: set.nFaults,
  };
}

async function check(run: Run, inputs: CheckInputs, folder: string): Promise<Result> {
  const { set } = inputs;
  const result = await checkInThread(run, checkOrder(inputs, originalPath(set.sha256), folder));
  const plan = result.load;
  if (plan === null) {
    run.progress(share.matching, `Refusing the table: ${figure(result.nFaults)} faults`);
    await recordRefusedSet(run.caller, set.publicId, result);
    return { set: set.publicId, state: 'refused', rows: result.rows, matched: 0, faults: result.nFaults };
  }
  await markSetChecked(run.caller, set.publicId, result);
  await load(run, inputs, { result, plan });
  return { set: set.publicId, state: 'matched', rows: result.rows, matched: plan.matchedRows, faults: 0 };
}

async function load(
  run: Run,
  { set, frames }: CheckInputs,
  { result, plan }: { readonly result: CheckResult; readonly plan: LoadPlan },
): Promise<void> {
  const tell = (rows: number): void => {
    run.signal.throwIfAborted();
    const part = rows / Math.max(1, result.rows);
    run.progress(
      share.matching + part * (0.99 - share.matching),
      `Loading: ${figure(rows)} of ${figure(result.rows)} rows`,
    );
  };
  tell(0);
  await recordMatchedSet(run.caller, set.publicId, { result, plan, seen: frames, onRows: tell });
}

function checkInThread(run: Run, order: CheckOrder): Promise<CheckResult> {
  const thread = startThread(
    {
      name: 'check-measurements',
      bundled: (options) =>
        new Worker(new URL('../threads/check-measurements.thread.ts', import.meta.url), { ...options }),
    },
    // A young generation of this size lets rows die young; the old one holds the distinct stars.
    { workerData: { order }, resourceLimits: { maxYoungGenerationSizeMb: 16, maxOldGenerationSizeMb: 2048 } },
  );
  return followThread<CheckMessage, CheckResult>({
    thread,
    signal: run.signal,
    onMessage: (message) => {
      switch (message.kind) {
        case 'reading': {
          const part = message.size === 0 ? 1 : message.bytes / message.size;
          run.progress(part * share.reading, `Reading line by line: ${figure(message.rows)} rows so far`);
          return undefined;
        }
        case 'matching':
          run.progress(share.reading, `Matching the stars of ${figure(message.rows)} rows`);
          return undefined;
        case 'end':
          return message.result;
      }
    },
  });
}
