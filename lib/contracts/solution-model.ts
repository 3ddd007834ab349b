import type { AirmassFormula } from '@/lib/astro/airmass';
import type { FitModel } from '@/lib/photometry/fit-model';
import type { SolveOptions } from './solve-options';

/** What a solve was asked, as it is stored: the options as they were sent, and the model that was made of them. */
export interface SolutionModel {
  /** Without the exclusions, which are rows of their own. */
  readonly options: Omit<SolveOptions, 'exclusions'>;
  readonly airmassFormula: AirmassFormula;
  readonly fit: FitModel;
}

/** What a solution was made from, as far as it is words: the observations themselves are rows. */
export interface SolutionInputs {
  /** The sets whose standards were fitted; those there were, until it is solved. */
  readonly sets: readonly { readonly id: string; readonly name: string; readonly sha256: string }[];
  readonly standardsSource: string;
  readonly equipmentEpoch: string | null;
  /** Sum of the versions of the frames: it differs once one of them has been corrected. Null until solved. */
  readonly frameVersions: number | null;
}
