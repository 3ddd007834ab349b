import { mkdir } from 'node:fs/promises';
import path from 'node:path';
import { Worker } from 'node:worker_threads';
import { dropCalibrated, storeCalibrated, type NewCalibrated } from '@/lib/server/acts/store-calibrated';
import type { JobResult } from '@/lib/server/jobs/kinds';
import { targetColumns, type TargetColumns } from '@/lib/server/reads/target-columns';
import { transformInputs, type TransformInputs } from '@/lib/server/reads/transform-inputs';
import { withWorkFolder } from '@/lib/server/storage/work-folders';
import type { Handler, JobRun } from '../handler';
import type { Transformed, TransformMessage, TransformOrder } from '../threads/transform-targets/messages';
import { followThread, startThread } from '../threads/start-thread';

type Run = JobRun<'transform-targets'>;
type Result = JobResult<'transform-targets'>;

/** Parts of the whole that have passed when all is read, and transformed. Measured with a million rows. */
const share = { read: 0.3, transformed: 0.6 } as const;
const figure = (rows: number): string => rows.toLocaleString('en-GB');

/**
 * Brings a night's targets to the standard system with an approved solution: all programmes of the night, whole or not
 * at all. Run again at any time it comes to the same end; a solution that is no longer approved leaves nothing.
 */
export const transformTargets: Handler<'transform-targets'> = async (run) => {
  const inputs = await transformInputs(run.caller, run.payload);
  const ended = endedResult(inputs);
  if (ended) return ended;
  if (inputs.solution.state === 'approved') {
    const results = await withWorkFolder(run.id, (folder) => transform(run, inputs, folder));
    if (results !== null) return results;
  }
  await dropCalibrated(run.caller, inputs);
  run.progress(share.read, 'The solution is no longer the approved one: nothing was stored.');
  return { outcome: 'not-approved', programmes: 0, measurements: 0, stars: 0 };
};

/** The result of an earlier run that came to its end. */
function endedResult({ transformations }: TransformInputs): Result | null {
  if (transformations.some(({ state }) => state === 'queued')) return null;
  const done = transformations.filter(({ state }) => state === 'done');
  const sum = (values: readonly (number | null)[]): number =>
    values.reduce<number>((total, value) => total + (value ?? 0), 0);
  return {
    outcome: transformations.length > 0 && done.length === 0 ? 'not-approved' : 'stored',
    programmes: done.length,
    measurements: sum(done.map(({ nMeasurements }) => nMeasurements)),
    stars: sum(done.map(({ nStars }) => nStars)),
  };
}

async function transform(run: Run, inputs: TransformInputs, folder: string): Promise<Result | null> {
  const columns = await targetColumns(run.caller, inputs, (rows, total) => {
    run.signal.throwIfAborted();
    run.progress(
      (share.read * rows) / Math.max(1, total),
      `Reading: ${figure(rows)} of ${figure(total)} rows`,
    );
  });
  const results: NewCalibrated[] = [];
  for (const { id, programme, programmeId, state } of inputs.transformations) {
    const own = columns.get(programmeId);
    if (!own || state !== 'queued') continue;
    const part = results.length / inputs.transformations.length;
    // Counted before the columns move to the thread.
    const nRead = own.measurements.star.length;
    run.progress(
      share.read + part * (share.transformed - share.read),
      `Transforming ${figure(nRead)} measurements${programme === null ? '' : ` of ${programme}`}`,
    );
    const ownFolder = path.join(folder, String(id));
    await mkdir(ownFolder);
    const order = { ...orderOf(inputs, own), folder: ownFolder };
    const { nStars, slices, nWithoutAirmass } = await inThread(order, run.signal);
    const nMeasurements = nRead - nWithoutAirmass;
    results.push({ id, nStars, slices, nMeasurements, nLeftOut: own.nLeftOut + nWithoutAirmass });
  }
  const stars = results.reduce((sum, { nStars }) => sum + nStars, 0);
  const stored = await storeCalibrated(run.caller, inputs, {
    results,
    onRows: (rows) => {
      run.signal.throwIfAborted();
      const part = share.transformed + (0.99 - share.transformed) * (rows / Math.max(1, stars));
      run.progress(part, `Storing: ${figure(rows)} of ${figure(stars)} stars`);
    },
  });
  if (!stored) return null;
  const measurements = results.reduce((sum, { nMeasurements }) => sum + nMeasurements, 0);
  return { outcome: 'stored', programmes: results.length, measurements, stars };
}

const orderOf = (inputs: TransformInputs, own: TargetColumns): Omit<TransformOrder, 'folder'> => ({
  measurements: own.measurements,
  formula: inputs.formula,
  skies: own.skies,
  names: own.names,
  ra: own.ra,
  dec: own.dec,
  calibrations: inputs.calibrations,
  options: inputs.options,
});

function inThread(order: TransformOrder, signal: AbortSignal): Promise<Transformed> {
  const { star, frame, instMag, instErr, saturated } = order.measurements;
  const thread = startThread(
    {
      name: 'transform-targets',
      bundled: (options) =>
        new Worker(new URL('../threads/transform-targets.thread.ts', import.meta.url), { ...options }),
    },
    {
      workerData: { order },
      // The columns move to the thread: a copy would double what a large night needs.
      transferList: [star, frame, instMag, instErr, saturated].map(({ buffer }) => buffer as ArrayBuffer),
      resourceLimits: { maxOldGenerationSizeMb: 2048 },
    },
  );
  return followThread<TransformMessage, Transformed>({ thread, signal, onMessage: ({ result }) => result });
}
