import { Worker } from 'node:worker_threads';
import type { JobResult } from '@/lib/server/jobs/kinds';
import { recordSolution } from '@/lib/server/acts/record-solution';
import { solveInputs, type SolveInputs } from '@/lib/server/reads/solve-inputs';
import { withWorkFolder } from '@/lib/server/storage/work-folders';
import type { Handler, JobRun } from '../handler';
import type { SolveMessage, SolveOrder, SolveResult } from '../threads/solve-night/messages';
import { followThread, startThread } from '../threads/start-thread';
import { writeObservations } from './observation-files';
import { solvedBands, solvedFindings } from './solved-bands';

type Run = JobRun<'solve-night'>;
type Result = JobResult<'solve-night'>;

/** Parts of the whole that have passed at each step. A fit takes most of the time, and cannot say how far it is. */
const share = { read: 0.1, fitted: 0.85, weighed: 0.9, written: 0.95 } as const;

const figure = (n: number): string => n.toLocaleString('en-GB');

/**
 * Solves a night in a thread and stores what was found. That a fit cannot determine a coefficient is a result like any
 * other; only bugs and outages fail. Run again at any time it comes to the same end.
 */
export const solveNight: Handler<'solve-night'> = async (run) => {
  run.progress(0, 'Reading the standards');
  const inputs = await solveInputs(run.caller, run.payload.solution);
  const ended = endedResult(inputs);
  if (ended) return ended;
  run.signal.throwIfAborted();
  const found = await solveInThread(run, inputs);
  return withWorkFolder(run.id, (folder) => record(run, { inputs, found, folder }));
};

/** The result of a solution that an earlier run brought to its end, or that nobody wants any more. */
function endedResult({ solution }: SolveInputs): Result | null {
  const { publicId, outcome, state, nObservations: observations, nUsed: used } = solution;
  if (outcome !== null) return { solution: publicId, outcome, observations, used };
  return state === 'draft' ? null : { solution: publicId, outcome: 'withdrawn', observations: 0, used: 0 };
}

interface Found {
  readonly inputs: SolveInputs;
  readonly found: SolveResult;
  readonly folder: string;
}

async function record(run: Run, { inputs, found, folder }: Found): Promise<Result> {
  const { solution, evidence } = found;
  const { observations } = inputs;
  const slices = await writeObservations(inputs, solution.observations, folder);
  run.signal.throwIfAborted();
  run.progress(share.written, 'Storing what was found');
  return recordSolution(run.caller, run.payload.solution, {
    outcome: solution.outcome,
    inputs: {
      sets: inputs.sets.map(({ publicId, name, sha256 }) => ({ id: publicId, name, sha256 })),
      standardsSource: inputs.standardsSource,
      equipmentEpoch: inputs.solution.inputs.equipmentEpoch,
      frameVersions: inputs.frameVersions,
    },
    inputHash: inputs.hash,
    findings: [...inputs.findings, ...solvedFindings(solution, inputs)],
    evidence: evidence.items,
    suggestedVerdict: evidence.suggested,
    nObservations: observations.instMag.length,
    nUsed: solution.observations.used.reduce((sum, used) => sum + used, 0),
    nStars: observations.starNames.length,
    nFrames: observations.frameNumbers.length,
    bands: solvedBands(solution, inputs),
    nights: inputs.nights,
    setIds: inputs.sets.map(({ id }) => id),
    slices,
  });
}

function solveInThread(run: Run, inputs: SolveInputs): Promise<SolveResult> {
  const { observations, history, limits, targets } = inputs;
  const n = observations.instMag.length;
  run.progress(share.read, `Fitting ${figure(n)} observations`);
  const order: SolveOrder = {
    observations,
    model: inputs.solution.model.fit,
    // The verdict is on the solution's own night, which is the first.
    context: { night: 0, limits, history, targets },
  };
  const thread = startThread(
    {
      name: 'solve-night',
      bundled: (options) =>
        new Worker(new URL('../threads/solve-night.thread.ts', import.meta.url), { ...options }),
    },
    { workerData: { order }, resourceLimits: { maxOldGenerationSizeMb: 2048 } },
  );
  return followThread<SolveMessage, SolveResult>({
    thread,
    signal: run.signal,
    onMessage: (message) => {
      switch (message.kind) {
        case 'weighing':
          run.progress(share.fitted, `Weighing the evidence of ${figure(n)} observations`);
          return undefined;
        case 'end':
          run.progress(share.weighed, `Writing down ${figure(n)} observations`);
          return message.result;
      }
    },
  });
}
