/** What a transformation is made from and what it gives: plain columns, no object per measurement. */
import type { BandName } from './bands';
import type { CoefficientName } from './fit-model';
import type { Range } from './night-solution';

/** Measurements, shape (n) each; frames, shape (n frames). Stars are numbered 0 … nStars − 1. */
export interface TargetMeasurements {
  readonly star: Uint32Array;
  readonly frame: Uint32Array;
  readonly instMag: Float64Array;
  readonly instErr: Float64Array;
  /** 1 where a pixel was at or near saturation. */
  readonly saturated: Uint8Array;
  /** Airmass of each measurement, for fields so wide that it differs from that of the frame; where absent the frame's. */
  readonly airmass?: Float64Array;
  readonly nStars: number;
  /** Place of the band in bandOrder. */
  readonly frameBand: Uint8Array;
  readonly frameAirmass: Float64Array;
  /** Hours from the mean time of the night's standards [h]. */
  readonly frameHours: Float64Array;
  /** Mid-exposure as BJD_TDB [d], for the programme's field. */
  readonly frameBjd: Float64Array;
  /** Offset of the frame known from elsewhere (standards on it, secondary standards) [mag]; NaN where unknown,
   * infinite where the frame must not be used. */
  readonly frameOffset: Float64Array;
  /** Standard errors of these, in place of the scatter of frames; where absent or NaN the scatter of frames stays [mag]. */
  readonly frameOffsetErr?: Float64Array;
}

/** Calibration of one band as a solution found it. */
export interface BandCalibration {
  readonly band: BandName;
  /** In the order of the covariance; what is absent is zero. */
  readonly names: readonly CoefficientName[];
  readonly values: Float64Array;
  /** Shape (p, p) row-major. */
  readonly covariance: Float64Array;
  readonly scatterObservation: number;
  /** 0 where it could not be told from the scatter of observations. */
  readonly scatterFrame: number;
  /** What the standards covered. */
  readonly airmass: Range;
  readonly colour: Range;
  readonly hours: Range;
}

export interface TransformOptions {
  /** B−V for stars that lack B or V; null leaves them without magnitude. [mag] */
  readonly assumedColour: { readonly value: number; readonly error: number } | null;
  /** Signal-to-noise ratio of all that is used in a band, below which the star is flagged [1]. */
  readonly lowSignal: number;
  /** Frame offset above which a magnitude is flagged [mag]. */
  readonly largeOffset: number;
  /** Whether the night's verdict is “usable with care”. */
  readonly nightWithCare: boolean;
}

/** A magnitude or colour of every star with its error budget, shape (n stars) each; NaN where it cannot be had. */
export interface CalibratedColumn {
  readonly value: Float64Array;
  /** Measurement, scatter of observation and of frame: falls as measurements are averaged. */
  readonly random: Float64Array;
  /** From the coefficients' covariance: common to the night. */
  readonly systematic: Float64Array;
}

export const calibratedQuantities = ['V', 'B', 'BV', 'UB', 'VR', 'VI'] as const;
export type CalibratedQuantity = (typeof calibratedQuantities)[number];

/** Shape (n stars) each. Total error is the root of the sum of squares of random and systematic. */
export interface CalibratedStars {
  readonly columns: Readonly<Record<CalibratedQuantity, CalibratedColumn>>;
  /** Measurements used, shape (n stars, 5 bands) row-major. */
  readonly counts: Uint16Array;
  /** Mean mid-exposure of the measurements used, with their weights in the solution, BJD_TDB [d]. */
  readonly bjd: Float64Array;
  /** Mean airmass of the measurements used, likewise [1]. */
  readonly airmass: Float64Array;
  /** Bits of calibratedFlags. */
  readonly flags: Uint16Array;
}
