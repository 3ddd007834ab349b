import type { AirmassFormula } from '@/lib/astro/airmass';
import type { ExposureSky } from '@/lib/astro/exposure-airmass';
import type { Slice } from '@/lib/contracts/measurement-check';
import type {
  BandCalibration,
  TargetMeasurements,
  TransformOptions,
} from '@/lib/photometry/target-measurements';

/** What the thread works from. */
export interface TransformOrder {
  /** An empty folder for what is to be loaded. */
  readonly folder: string;
  readonly measurements: TargetMeasurements;
  readonly formula: AirmassFormula;
  /** One for each frame. */
  readonly skies: readonly (ExposureSky | null)[];
  readonly names: readonly string[];
  /** J2000 [deg]; NaN without one. */
  readonly ra: Float64Array;
  readonly dec: Float64Array;
  readonly calibrations: readonly BandCalibration[];
  readonly options: TransformOptions;
}

export interface Transformed {
  /** Measurements without an airmass though their frame has one: the star is below the horizon, or beyond the formula. */
  readonly nWithoutAirmass: number;
  /** Stars with at least one magnitude or colour. */
  readonly nStars: number;
  /** In the order of lib/server/data/transformation-runs.ts. */
  readonly slices: readonly Slice[];
}

export type TransformMessage = { readonly kind: 'end'; readonly result: Transformed };
