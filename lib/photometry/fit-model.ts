/**
 * What a fit of a night is asked to do. Everything that can change its result is written out here and stored with the
 * solution: no default hides in the code of the fit.
 */
import type { BandName } from './bands';
import type { BandCoefficients } from './transformation-model';

/** Coefficients of one band, in the order in which results hold them. */
export const coefficientOrder = [
  'zeroPoint',
  'extinction',
  'colourTerm',
  'secondOrderExtinction',
  'drift',
  'extinctionDrift',
  'colourTerm2',
] as const satisfies readonly (keyof BandCoefficients)[];
export type CoefficientName = (typeof coefficientOrder)[number];

/** How one coefficient enters: found by the fit, held at a value, or found with a value known beforehand ± its error. */
export type Term =
  | { readonly status: 'free' }
  | { readonly status: 'fixed'; readonly value: number }
  | { readonly status: 'prior'; readonly value: number; readonly error: number };

/** One band of the model. A coefficient without a term is not in the model: it is zero. */
export interface BandModel {
  readonly band: BandName;
  readonly terms: Readonly<Partial<Record<CoefficientName, Term>>>;
}

/** Where the fit stops believing, editable and stored. */
export interface FitLimits {
  /** Smallest range of airmass that determines a free extinction [airmass]. */
  readonly airmassRange: number;
  /** Smallest range of colour that determines a free colour term [mag]. */
  readonly colourRange: number;
  /** Robust sigmas beyond which an observation is rejected [1]. */
  readonly rejectSigmas: number;
  /** Tuning constant of the bisquare [its scale]. */
  readonly bisquare: number;
}

/** Common practice, no source; the bisquare's constant has 95 % efficiency for normal errors (Beaton and Tukey 1974). */
export const usualLimits: FitLimits = {
  airmassRange: 0.3,
  colourRange: 0.5,
  rejectSigmas: 4,
  bisquare: 4.685,
};

export interface FitModel {
  readonly bands: readonly BandModel[];
  readonly limits: FitLimits;
  /** Seed of the high-breakdown start, an integer of 32 bits: the same observations give the same solution. */
  readonly seed: number;
}

/** The terms that a night is usually solved with: zero point, extinction and colour term free; second-order extinction
 * −0.03 ± 0.01 known beforehand in B and none in the other bands.
 * @param band - of the standard system
 * @returns the model of this band
 * @source Hardie 1962, in Astronomical Techniques, chapter 8, p. 187, for the second-order extinction in B; the rest common
 * practice, no source */
export function usualBandModel(band: BandName): BandModel {
  const free: Term = { status: 'free' };
  const secondOrder: Term =
    band === 'B' ? { status: 'prior', value: -0.03, error: 0.01 } : { status: 'fixed', value: 0 };
  return {
    band,
    terms: { zeroPoint: free, extinction: free, colourTerm: free, secondOrderExtinction: secondOrder },
  };
}
