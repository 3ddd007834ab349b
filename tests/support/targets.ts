import { bandPlace, type BandName } from '@/lib/photometry/bands';
import { coefficientOrder, type CoefficientName } from '@/lib/photometry/fit-model';
import type {
  BandCalibration,
  CalibratedQuantity,
  CalibratedStars,
  TargetMeasurements,
  TransformOptions,
} from '@/lib/photometry/target-measurements';
import { instrumentalOffset, type BandCoefficients } from '@/lib/photometry/transformation-model';
import reference from '@/tests/reference/transformation.json';

const noCoefficients: BandCoefficients = {
  zeroPoint: 0,
  extinction: 0,
  colourTerm: 0,
  secondOrderExtinction: 0,
  drift: 0,
  extinctionDrift: 0,
  colourTerm2: 0,
};

/** A calibration with all coefficients, their errors uncorrelated and no scatter, over wide ranges. */
export function calibration(
  band: BandName,
  coefficients: Partial<BandCoefficients>,
  rest: Partial<BandCalibration> & { readonly errors?: Partial<Record<CoefficientName, number>> } = {},
): BandCalibration {
  const { errors = {}, ...other } = rest;
  const p = coefficientOrder.length;
  const covariance = new Float64Array(p * p);
  coefficientOrder.forEach((name, i) => (covariance[i * p + i] = (errors[name] ?? 0) ** 2));
  return {
    band,
    names: coefficientOrder,
    values: Float64Array.from(coefficientOrder, (name) => coefficients[name] ?? 0),
    covariance,
    scatterObservation: 0,
    scatterFrame: 0,
    airmass: { min: 1, max: 2.5 },
    colour: { min: -0.5, max: 2.5 },
    hours: { min: -6, max: 6 },
    ...other,
  };
}

const { z_v, k_v, c_v, z_b, k_b, c_b, k2 } = reference.coefficients;
/** Coefficients of the closed form. */
export const inV = { zeroPoint: z_v, extinction: k_v, colourTerm: c_v };
export const inB = { zeroPoint: z_b, extinction: k_b, colourTerm: c_b, secondOrderExtinction: k2 };
export const closedForm = [calibration('V', inV), calibration('B', inB)];
export const five = [
  ...closedForm,
  calibration('U', { zeroPoint: 5.1, extinction: 0.46, colourTerm: -0.05, secondOrderExtinction: -0.02 }),
  calibration('R', { zeroPoint: 2.4, extinction: 0.08, colourTerm: 0.04 }),
  calibration('I', { zeroPoint: 3.2, extinction: 0.04, colourTerm: -0.02 }),
];
/** Tolerance of what rounding alone may change. */
export const exact = { absolute: 1e-9, unit: 'mag' } as const;

/** Coefficients of a calibration by name. */
export function coefficientsOf({ names, values }: BandCalibration): BandCoefficients {
  const found = names.map((name, i) => [name, values[i] ?? Number.NaN] as const);
  return { ...noCoefficients, ...Object.fromEntries(found) };
}

export interface FrameOf {
  readonly band: BandName;
  readonly airmass: number;
  readonly hours?: number;
  readonly bjd?: number;
  readonly offset?: number;
  readonly offsetErr?: number;
}

export interface MeasurementOf {
  readonly star: number;
  readonly frame: number;
  readonly mag: number;
  readonly err?: number;
  readonly isSaturated?: boolean;
}

/** Columns from lists of frames and measurements. */
export function targetMeasurements(
  frames: readonly FrameOf[],
  measured: readonly MeasurementOf[],
): TargetMeasurements {
  return {
    star: Uint32Array.from(measured, ({ star }) => star),
    frame: Uint32Array.from(measured, ({ frame }) => frame),
    instMag: Float64Array.from(measured, ({ mag }) => mag),
    instErr: Float64Array.from(measured, ({ err }) => err ?? 0.01),
    saturated: Uint8Array.from(measured, ({ isSaturated }) => (isSaturated === true ? 1 : 0)),
    nStars: measured.reduce((most, { star }) => Math.max(most, star + 1), 0),
    frameBand: Uint8Array.from(frames, ({ band }) => bandPlace[band]),
    frameAirmass: Float64Array.from(frames, ({ airmass }) => airmass),
    frameHours: Float64Array.from(frames, ({ hours }) => hours ?? 0),
    frameBjd: Float64Array.from(frames, ({ bjd }) => bjd ?? 2_461_000.5),
    frameOffset: Float64Array.from(frames, ({ offset }) => offset ?? Number.NaN),
    frameOffsetErr: Float64Array.from(frames, ({ offsetErr }) => offsetErr ?? Number.NaN),
  };
}

/** A star as it is. */
export interface TrueStar {
  readonly V: number;
  readonly BV: number;
  readonly UB?: number;
  readonly VR?: number;
  readonly VI?: number;
}

/** What a noiseless night would measure of a star on a frame. */
export function trueInstMag(
  star: TrueStar,
  frame: FrameOf,
  calibrations: readonly BandCalibration[],
): number {
  const { V, BV, UB = Number.NaN, VR = Number.NaN, VI = Number.NaN } = star;
  const magnitude = { U: V + BV + UB, B: V + BV, V, R: V - VR, I: V - VI }[frame.band];
  const colour = { U: UB, B: BV, V: BV, R: VR, I: VI }[frame.band];
  const own = calibrations.find(({ band }) => band === frame.band);
  if (own === undefined) throw new Error(`Band ${frame.band} has no calibration.`);
  const state = { airmass: frame.airmass, colour, hours: frame.hours ?? 0 };
  return magnitude + instrumentalOffset(coefficientsOf(own), state) + (frame.offset ?? 0);
}

export const usualOptions: TransformOptions = {
  assumedColour: null,
  lowSignal: 10,
  largeOffset: 0.1,
  nightWithCare: false,
};

/** Every star on every frame, without noise. */
export const noiselessTargets = (
  stars: readonly TrueStar[],
  frames: readonly FrameOf[],
  calibrations: readonly BandCalibration[],
): TargetMeasurements =>
  targetMeasurements(
    frames,
    stars.flatMap((star, s) =>
      frames.map((frame, f) => ({ star: s, frame: f, mag: trueInstMag(star, frame, calibrations) })),
    ),
  );

/** One number of the result; NaN where the star has none. */
export const calibratedValue = (
  result: CalibratedStars,
  quantity: CalibratedQuantity,
  part: 'value' | 'random' | 'systematic' = 'value',
  star = 0,
): number => result.columns[quantity][part][star] ?? Number.NaN;
