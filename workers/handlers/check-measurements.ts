import { Worker } from 'node:worker_threads';
import type { CheckResult, Slice } from '@/lib/contracts/measurement-check';
import { Fault, isFault } from '@/lib/faults/fault';
import { loadMeasurements } from '@/lib/server/acts/load-measurements';
import { markSetChecked } from '@/lib/server/acts/mark-set-checked';
import { recordRefusedSet } from '@/lib/server/acts/record-refused-set';
import type { JobResult } from '@/lib/server/jobs/kinds';
import { checkInputs, type CheckInputs } from '@/lib/server/reads/check-inputs';
import { originalPath } from '@/lib/server/storage/originals';
import { withWorkFolder } from '@/lib/server/storage/work-folders';
import { asyncQueue } from '../async-queue';
import type { Handler, JobRun } from '../handler';
import type { CheckMessage, CheckOrder } from '../threads/check-measurements/messages';
import { followThread, startThread } from '../threads/start-thread';
import { checkOrder } from './check-order';

type Run = JobRun<'check-measurements'>;
type Result = JobResult<'check-measurements'>;

/** The log may be corrected while a table is being checked; so often the check begins anew before it waits its turn again. */
const mostAttempts = 3;
/** The part of the whole that has passed when the table is read. Measured with a million rows. */
const share = { reading: 0.8 } as const;

const figure = (rows: number): string => rows.toLocaleString('en-GB');

/**
 * Checks an uploaded table in a thread, which leaves the rows in files, and loads them meanwhile in one transaction; or
 * refuses the table with all its faults. Run again at any time it comes to the same end.
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
  const { set, frames } = inputs;
  const slices = asyncQueue<Slice>();
  // Whichever of the two fails first stops the other, and the folder stays until both have ended.
  const stop = new AbortController();
  const order = checkOrder(inputs, originalPath(set.sha256), folder);
  const told = tellProgress(run);
  const result = checkInThread(order, AbortSignal.any([run.signal, stop.signal]), {
    told,
    onSlice: slices.push,
  });
  result.then(slices.end, slices.fail);
  const checked = result.then(async (found) => {
    if (found.load !== null) await markSetChecked(run.caller, set.publicId, found);
    return found;
  });
  // It may fail while slices are still being loaded; the load hears of it when it comes to it.
  checked.catch(() => undefined);
  try {
    const found = await loadMeasurements(run.caller, set.publicId, {
      slices,
      result: checked,
      seen: frames,
      onRows: (rows) => {
        run.signal.throwIfAborted();
        told.loaded(rows);
      },
    });
    return await settled(run, inputs, found);
  } finally {
    stop.abort(new Error('The load has ended.'));
    await Promise.allSettled([result, checked]);
  }
}

async function settled(run: Run, { set }: CheckInputs, found: CheckResult): Promise<Result> {
  const { rows, nFaults, load } = found;
  if (load !== null)
    return { set: set.publicId, state: 'matched', rows, matched: load.matchedRows, faults: 0 };
  run.progress(share.reading, `Refusing the table: ${figure(nFaults)} faults`);
  await recordRefusedSet(run.caller, set.publicId, found);
  return { set: set.publicId, state: 'refused', rows, matched: 0, faults: nFaults };
}

interface Told {
  readonly reading: (part: number, rows: number) => void;
  readonly matching: (rows: number) => void;
  readonly loaded: (rows: number) => void;
}

/** Reading and loading go on side by side: while the table is read its bytes are the measure, then the rows that are left. */
function tellProgress(run: Run): Told {
  let total = 0;
  return {
    reading: (part, rows) =>
      run.progress(part * share.reading, `Reading line by line: ${figure(rows)} rows so far`),
    matching: (rows) => {
      total = rows;
      run.progress(share.reading, `Matching the stars of ${figure(rows)} rows`);
    },
    loaded: (rows) => {
      if (total === 0) return;
      const part = share.reading + (0.99 - share.reading) * (rows / total);
      run.progress(part, `Loading: ${figure(rows)} of ${figure(total)} rows`);
    },
  };
}

function checkInThread(
  order: CheckOrder,
  signal: AbortSignal,
  { told, onSlice }: { readonly told: Told; readonly onSlice: (slice: Slice) => void },
): Promise<CheckResult> {
  const thread = startThread(
    {
      name: 'check-measurements',
      bundled: (options) =>
        new Worker(new URL('../threads/check-measurements.thread.ts', import.meta.url), { ...options }),
    },
    // A young generation of this size lets rows die young; the old one holds the distinct stars.
    { workerData: { order }, resourceLimits: { maxYoungGenerationSizeMb: 48, maxOldGenerationSizeMb: 2048 } },
  );
  return followThread<CheckMessage, CheckResult>({
    thread,
    signal,
    onMessage: (message) => {
      switch (message.kind) {
        case 'reading':
          told.reading(message.size === 0 ? 1 : message.bytes / message.size, message.rows);
          return undefined;
        case 'slice':
          onSlice(message.slice);
          return undefined;
        case 'matching':
          told.matching(message.rows);
          return undefined;
        case 'end':
          return message.result;
      }
    },
  });
}
