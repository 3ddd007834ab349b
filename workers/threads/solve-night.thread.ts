import { parentPort, workerData } from 'node:worker_threads';
import { solveNights } from '@/lib/photometry/solve-nights';
import { weighEvidence } from '@/lib/photometry/weigh-evidence';
import type { SolveMessage, SolveOrder } from './solve-night/messages';

const send = (message: SolveMessage): void => parentPort?.postMessage(message);

/** Fits, weighs and reports; the thread is stopped from outside when nobody waits for it any more. */
function solve({ observations, model, context }: SolveOrder): void {
  const solution = solveNights(observations, model);
  send({ kind: 'weighing' });
  const evidence = weighEvidence(solution, context);
  send({ kind: 'end', result: { solution, evidence } });
}

solve((workerData as { readonly order: SolveOrder }).order);
