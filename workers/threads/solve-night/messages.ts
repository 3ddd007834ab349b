import type { FitModel } from '@/lib/photometry/fit-model';
import type { NightEvidence } from '@/lib/photometry/night-evidence';
import type { NightSolution } from '@/lib/photometry/night-solution';
import type { StandardObservations } from '@/lib/photometry/standard-observations';
import type { EvidenceContext } from '@/lib/photometry/weigh-evidence';

/** Everything that the thread works from: it can reach neither the database nor the clock. */
export interface SolveOrder {
  readonly observations: StandardObservations;
  readonly model: FitModel;
  readonly context: EvidenceContext;
}

export interface SolveResult {
  readonly solution: NightSolution;
  readonly evidence: NightEvidence;
}

export type SolveMessage =
  { readonly kind: 'weighing' } | { readonly kind: 'end'; readonly result: SolveResult };
