/** What a fit found: plain data that can be cloned between threads and stored as it stands. */
import type { BandName } from './bands';
import type { CoefficientName, Term } from './fit-model';

/** Something a person should know about a fit, in words that a page shows as they stand. */
export interface Finding {
  /** `stop`: something could not be determined. `caution`: the numbers stand, with care. `note`: good to know. */
  readonly weight: 'stop' | 'caution' | 'note';
  readonly kind: FindingKind;
  readonly band: BandName | null;
  /** Place of the night; null where it concerns all. */
  readonly night: number | null;
  readonly coefficient: CoefficientName | null;
  /** What is the case and why, a whole sentence. */
  readonly reason: string;
  /** What would help, a whole sentence; empty where nothing needs help. */
  readonly remedy: string;
}

export type FindingKind =
  | 'rank-deficient'
  | 'airmass-range'
  | 'colour-range'
  | 'too-few-stars'
  | 'too-few-frames'
  | 'too-few-observations'
  | 'missing-values'
  | 'frame-scatter-dropped'
  | 'star-rejected'
  | 'frame-rejected'
  | 'run-rejected'
  | 'many-rejected'
  | 'overruled'
  | 'not-converged'
  | 'correlated'
  | 'suspicious-extinction'
  | 'prior-disagrees';

export interface FittedCoefficient {
  readonly name: CoefficientName;
  readonly term: Term;
  /** Null where the observations cannot determine it; the band then has no determined outcome. [unit of the term] */
  readonly value: number | null;
  /** Standard error; 0 for a fixed one; null like the value. */
  readonly error: number | null;
  /** Half width of the 95 % interval, by Student's t for the degrees of freedom that there are; null like the value. */
  readonly interval95: number | null;
  /** Variance over what it would be were the terms uncorrelated [1]; null where it has no meaning. */
  readonly varianceInflation: number | null;
}

export interface Range {
  readonly min: number;
  readonly max: number;
}

/** One band of one night. */
export interface BandSolution {
  readonly band: BandName;
  readonly night: number;
  readonly outcome: 'determined' | 'undetermined';
  /** In coefficientOrder; only those in the model. */
  readonly coefficients: readonly FittedCoefficient[];
  /** Covariance of these, shape (p, p) row-major; rows of fixed ones are zero; empty when undetermined. */
  readonly covariance: Float64Array;
  /** Correlation, likewise; NaN where a variance is zero. */
  readonly correlation: Float64Array;
  /** REML standard deviations [mag]. `frame` is null where it is not identifiable; both null when undetermined. */
  readonly scatter: { readonly observation: number | null; readonly frame: number | null };
  readonly nUsed: number;
  readonly nRejected: number;
  readonly nStars: number;
  readonly nFrames: number;
  /** Degrees of freedom of the residuals; null when undetermined. */
  readonly dof: number | null;
  readonly reducedChi2: number | null;
  /** Of the whitened design with columns scaled to unit length [1]. */
  readonly conditionNumber: number | null;
  /** Of the used observations. Hours from the mean time of the night's standards. Null without any. */
  readonly airmass: Range | null;
  readonly colour: Range | null;
  readonly hours: Range | null;
  /** Root mean square of predictions of each star from all others [mag]; null where it cannot be made. */
  readonly leaveOneStarOut: number | null;
  /** Drift of the zero point when asked for in a fit of its own beside this one [mag per hour]. */
  readonly driftTest: { readonly value: number; readonly error: number } | null;
  /** Runs of residuals' signs in time (Wald and Wolfowitz 1940): standard normal deviate [1]. */
  readonly runsTest: number | null;
  readonly crossChecks: {
    /** A line of instrumental magnitude against airmass for each star with a wide range of it. */
    readonly bouguer: readonly {
      readonly star: number;
      readonly extinction: number;
      readonly error: number;
      readonly n: number;
    }[];
    /** Extinction from pairs of the same colour at low and high altitude; null without pairs. */
    readonly highLow: { readonly extinction: number; readonly error: number; readonly n: number } | null;
    /** Colour term from stars of very different colour on one frame; null without pairs. */
    readonly colourPairs: { readonly colourTerm: number; readonly error: number; readonly n: number } | null;
  };
}

/** Why an observation was not used, as a code; its words stand in `reasonWords`. */
export const observationReasons = {
  used: 0,
  outlier: 1,
  star: 2,
  frame: 3,
  run: 4,
  person: 5,
  'no-colour': 6,
  'not-fitted': 7,
} as const;

/** Every observation that the fit was given, shape (n) each, in the order given. */
export interface ObservationResults {
  /** Colour index of its band [mag]; NaN where unknown. */
  readonly colour: Float64Array;
  /** Standard magnitude in its band [mag]; NaN where unknown. */
  readonly magnitude: Float64Array;
  /** Observed − fitted by the coefficients alone [mag]; NaN where there is no fit. */
  readonly residual: Float64Array;
  /** The residual in its own standard errors, scatter and star error included [1]; NaN likewise. */
  readonly standardised: Float64Array;
  /** Weight in the last robust step, 0 … 1 [1]. */
  readonly weight: Float64Array;
  /** Leverage in the whitened design, 0 … 1 [1]; NaN for what is not used. */
  readonly leverage: Float64Array;
  /** Cook's distance [1]; NaN for what is not used. */
  readonly influence: Float64Array;
  /** 1 where the fit used it. */
  readonly used: Uint8Array;
  /** Values of `observationReasons`. */
  readonly reason: Uint8Array;
  /** The reason in words, shape (n); empty for what is used. */
  readonly reasonWords: readonly string[];
}

/** A fit of one or several nights. */
export interface NightSolution {
  /** Determined when every band of every night is. */
  readonly outcome: 'determined' | 'undetermined';
  /** By night, then in the order of the model's bands. */
  readonly bands: readonly BandSolution[];
  readonly observations: ObservationResults;
  readonly findings: readonly Finding[];
}
