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
  readonly names: readonly string[];
  /** J2000 [deg]; NaN without one. */
  readonly ra: Float64Array;
  readonly dec: Float64Array;
  readonly calibrations: readonly BandCalibration[];
  readonly options: TransformOptions;
}

export interface Transformed {
  /** Stars with at least one magnitude or colour. */
  readonly nStars: number;
  /** In the order of lib/server/data/transformation-runs.ts. */
  readonly slices: readonly Slice[];
}

export type TransformMessage = { readonly kind: 'end'; readonly result: Transformed };
