/**
 * Instrumental magnitudes of a night to the standard system: each star's measurements are solved together for its
 * magnitude and colours, by least squares with weights 1 / (instErr² + scatterObservation² + scatterFrame²).
 *
 * What a frame shares counts as independent noise here: a star is measured once on a frame, so its own measurements do
 * not share it. Measurements without finite magnitude, positive error, airmass or calibrated band are not used.
 *
 * | measured | gives |
 * |---|---|
 * | B and V | V, B, B−V |
 * | U beside B, R or I beside V | U−B, V−R, V−I as well |
 * | V or B alone | V or B with an assumed B−V, or nothing |
 *
 * A star whose iteration (only with T2) does not converge has NaN and no measurements used.
 */
import { bandPlace, nBands } from './bands';
import { calibratedFlags } from './calibrated-flags';
import { magnitudePerRelativeFlux } from './ccd-noise';
import { frameConstants, termsByBand, type BandTerms, type FrameConstants } from './frame-constants';
import {
  assumedPlace,
  colourPlace,
  moment,
  nMoments,
  solveStar,
  starEquations,
  starVariances,
  type StarEquations,
} from './star-equations';
import {
  calibratedQuantities,
  type CalibratedColumn,
  type CalibratedQuantity,
  type CalibratedStars,
  type TargetMeasurements,
  type TransformOptions,
  type BandCalibration,
} from './target-measurements';

const { U, B, V, R, I } = bandPlace;
/** Combinations of theta = V, B−V, U−B, V−R, V−I. */
const gradients: Readonly<Record<CalibratedQuantity, readonly number[]>> = {
  V: [1, 0, 0, 0, 0],
  B: [1, 1, 0, 0, 0],
  BV: [0, 1, 0, 0, 0],
  UB: [0, 0, 1, 0, 0],
  VR: [0, 0, 0, 1, 0],
  VI: [0, 0, 0, 0, 1],
};
const largestCount = 65_535;

/** Calibrates all stars of a night.
 * @param measurements - shape (n) each, their frames shape (n frames) each [mag, h, d]
 * @param calibrations - of the bands, at most one each
 * @param options - assumed colour, limits of the flags
 * @returns magnitudes and colours with random and systematic error, shape (n stars) each [mag]; NaN where there is none
 * @throws {RangeError} when arrays disagree in length, a star, frame or band does not exist, a band is calibrated twice,
 * or there are more than 65,535 frames
 * @accuracy closed form of two bands: 1e-9 mag; systematic errors to first order
 * @source Hardie 1962, in Astronomical Techniques, chapter 8, solved by least squares for all frames together */
export function transformTargets(
  measurements: TargetMeasurements,
  calibrations: readonly BandCalibration[],
  options: TransformOptions,
): CalibratedStars {
  requireShapes(measurements);
  const terms = termsByBand(calibrations);
  const frames = frameConstants(measurements, terms, options);
  const firstBjd = measurements.frameBjd.find(Number.isFinite) ?? Number.NaN;
  const night: Night = { measurements, frames, terms, options, firstBjd, ...sortByStar(measurements) };
  const stars = emptyStars(measurements.nStars);
  const tally = newTally(starEquations(terms));
  for (let s = 0; s < measurements.nStars; s += 1) {
    gather(night, s, tally);
    solveInto(stars, night, s, tally);
  }
  return stars;
}

interface Night {
  readonly measurements: TargetMeasurements;
  readonly frames: FrameConstants;
  readonly terms: readonly (BandTerms | undefined)[];
  readonly options: TransformOptions;
  /** From which dates are counted, so that their sums lose nothing [d]. */
  readonly firstBjd: number;
  /** Measurements of star s stand at start[s] … start[s + 1] − 1 of order. */
  readonly order: Uint32Array;
  readonly start: Uint32Array;
}

/** What the measurements of one star add up to, per band; one for all stars. */
interface Tally {
  readonly equations: StarEquations;
  readonly counts: Uint32Array;
  readonly unsaturated: Uint32Array;
  /** Sum of 1 / instErr² [mag⁻²]. */
  readonly signal: Float64Array;
  /** Sum of w·(BJD − firstBjd) [d mag⁻²]. */
  readonly wBjd: Float64Array;
  readonly flags: Uint16Array;
  readonly variances: Float64Array;
}

const newTally = (equations: StarEquations): Tally => ({
  equations,
  counts: new Uint32Array(nBands),
  unsaturated: new Uint32Array(nBands),
  signal: new Float64Array(nBands),
  wBjd: new Float64Array(nBands),
  flags: new Uint16Array(nBands),
  variances: new Float64Array(2),
});

function emptyStars(nStars: number): CalibratedStars {
  const nan = (): Float64Array => new Float64Array(nStars).fill(Number.NaN);
  const column = (): CalibratedColumn => ({ value: nan(), random: nan(), systematic: nan() });
  return {
    columns: {
      V: column(),
      B: column(),
      BV: column(),
      UB: column(),
      VR: column(),
      VI: column(),
    },
    counts: new Uint16Array(nStars * nBands),
    bjd: nan(),
    airmass: nan(),
    flags: new Uint16Array(nStars),
  };
}

/** Counting sort: linear in the number of measurements. */
function sortByStar({ star, nStars }: TargetMeasurements): Pick<Night, 'order' | 'start'> {
  const start = new Uint32Array(nStars + 1);
  for (let m = 0; m < star.length; m += 1) start[star[m]! + 1]! += 1;
  for (let s = 0; s < nStars; s += 1) start[s + 1]! += start[s]!;
  const next = start.slice();
  const order = new Uint32Array(star.length);
  for (let m = 0; m < star.length; m += 1) {
    const s = star[m]!;
    order[next[s]!] = m;
    next[s]! += 1;
  }
  return { order, start };
}

const airmassOf = ({ airmass, frame, frameAirmass }: TargetMeasurements, m: number): number =>
  airmass?.[m] ?? frameAirmass[frame[m]!]!;

/** Variance of a measurement; NaN where it cannot be used. */
function usableVariance({ measurements, frames }: Night, m: number): number {
  const f = measurements.frame[m]!;
  const err = measurements.instErr[m]!;
  const known = measurements.instMag[m]! - frames.constant[f]! - airmassOf(measurements, m);
  const isUsable = err > 0 && Number.isFinite(known);
  return isUsable ? err * err + frames.variance[f]! : Number.NaN;
}

/** Adds up one star's measurements. Saturated ones are left out of a band that has others. */
function gather(night: Night, s: number, tally: Tally): void {
  const { measurements, frames, terms, order, start } = night;
  const { moments } = tally.equations;
  const { counts, unsaturated, signal, wBjd, flags } = tally;
  for (const sums of [moments, counts, unsaturated, signal, wBjd, flags]) sums.fill(0);
  for (let k = start[s]!; k < start[s + 1]!; k += 1) {
    const m = order[k]!;
    if (measurements.saturated[m] === 0 && usableVariance(night, m) > 0)
      unsaturated[measurements.frameBand[measurements.frame[m]!]!]! += 1;
  }
  for (let k = start[s]!; k < start[s + 1]!; k += 1) {
    const m = order[k]!;
    const f = measurements.frame[m]!;
    const b = measurements.frameBand[f]!;
    const variance = usableVariance(night, m);
    const isSaturated = measurements.saturated[m] !== 0;
    if (!(variance > 0) || (isSaturated && unsaturated[b]! > 0)) continue;
    const w = 1 / variance;
    const X = airmassOf(measurements, m);
    const t = measurements.frameHours[f]!;
    const wy = w * (measurements.instMag[m]! - frames.constant[f]! - frames.perAirmass[f]! * X);
    const at = b * nMoments;
    moments[at + moment.w]! += w;
    moments[at + moment.wX]! += w * X;
    moments[at + moment.wXX]! += w * X * X;
    moments[at + moment.wt]! += w * t;
    moments[at + moment.wXt]! += w * t * X;
    moments[at + moment.wXXt]! += w * t * X * X;
    moments[at + moment.wy]! += wy;
    moments[at + moment.wXy]! += wy * X;
    counts[b]! += 1;
    signal[b]! += 1 / measurements.instErr[m]! ** 2;
    wBjd[b]! += w * (measurements.frameBjd[f]! - night.firstBjd);
    const { min, max } = terms[b]!.calibration.airmass;
    flags[b]! |=
      frames.flags[f]! |
      (isSaturated ? 1 << calibratedFlags.saturated.bit : 0) |
      (X < min || X > max ? 1 << calibratedFlags.airmass_range.bit : 0);
  }
}

/** Decides what can be had from the bands measured, solves, writes. */
function solveInto(stars: CalibratedStars, night: Night, s: number, tally: Tally): void {
  const { counts, equations } = tally;
  const { isUsed, isSought, theta } = equations;
  const { assumedColour } = night.options;
  const [hasB, hasV] = [counts[B]! > 0, counts[V]! > 0];
  const isAlone = hasB !== hasV;
  if (counts.filter((count) => count > 0).length === 1)
    stars.flags[s]! |= 1 << calibratedFlags.single_band.bit;
  if ((!hasB && !hasV) || (isAlone && assumedColour === null)) return;
  isUsed.set([+(hasB && counts[U]! > 0), +hasB, +hasV, +(hasV && counts[R]! > 0), +(hasV && counts[I]! > 0)]);
  isSought.set([1, +!isAlone, isUsed[U]!, isUsed[R]!, isUsed[I]!]);
  theta.fill(0);
  if (isAlone) theta[assumedPlace] = assumedColour!.value;
  if (!solveStar(equations)) return;
  const isHad = {
    V: hasV,
    B: hasB,
    BV: !isAlone,
    UB: isUsed[U] === 1,
    VR: isUsed[R] === 1,
    VI: isUsed[I] === 1,
  };
  for (const quantity of calibratedQuantities) {
    if (isHad[quantity])
      writeQuantity(stars.columns[quantity], s, tally, {
        gradient: gradients[quantity],
        assumedErr: isAlone ? assumedColour!.error : 0,
      });
  }
  writeSummary(stars, night, s, tally);
  if (isAlone) stars.flags[s]! |= 1 << calibratedFlags.assumed_colour.bit;
}

function writeQuantity(
  { value, random, systematic }: CalibratedColumn,
  s: number,
  { equations, variances }: Tally,
  { gradient, assumedErr }: { readonly gradient: readonly number[]; readonly assumedErr: number },
): void {
  let sum = 0;
  for (let i = 0; i < nBands; i += 1) sum += gradient[i]! * equations.theta[i]!;
  starVariances(equations, gradient, assumedErr, variances);
  value[s] = sum;
  random[s] = Math.sqrt(variances[0]!);
  // Rounding can leave a variance of nothing just below zero.
  systematic[s] = Math.sqrt(Math.max(0, variances[1]!));
}

/** Counts, means and flags of what was used. */
function writeSummary(stars: CalibratedStars, night: Night, s: number, tally: Tally): void {
  const { equations, counts, signal, wBjd } = tally;
  const { options, terms, firstBjd } = night;
  let [w, wX, sumBjd, flags] = [
    0,
    0,
    0,
    options.nightWithCare ? 1 << calibratedFlags.night_with_care.bit : 0,
  ];
  for (let b = 0; b < nBands; b += 1) {
    if (equations.isUsed[b] === 0) continue;
    stars.counts[s * nBands + b] = counts[b]!;
    w += equations.moments[b * nMoments + moment.w]!;
    wX += equations.moments[b * nMoments + moment.wX]!;
    sumBjd += wBjd[b]!;
    flags |= tally.flags[b]!;
    const colour = equations.theta[colourPlace[b]!]!;
    const { min, max } = terms[b]!.calibration.colour;
    if (colour < min || colour > max) flags |= 1 << calibratedFlags.colour_range.bit;
    if (magnitudePerRelativeFlux * Math.sqrt(signal[b]!) < options.lowSignal)
      flags |= 1 << calibratedFlags.low_signal.bit;
  }
  stars.airmass[s] = wX / w;
  stars.bjd[s] = firstBjd + sumBjd / w;
  stars.flags[s]! |= flags;
}

function requireShapes(measurements: TargetMeasurements): void {
  const { star, frame, instMag, instErr, saturated, airmass, nStars } = measurements;
  const { frameBand, frameAirmass, frameHours, frameBjd, frameOffset, frameOffsetErr } = measurements;
  const isEqual = (columns: readonly ArrayLike<number>[]): boolean =>
    columns.every(({ length }) => length === columns[0]!.length);
  if (!isEqual([star, frame, instMag, instErr, saturated, airmass ?? star]))
    throw new RangeError('The columns of the measurements differ in length.');
  if (!isEqual([frameBand, frameAirmass, frameHours, frameBjd, frameOffset, frameOffsetErr ?? frameOffset]))
    throw new RangeError('The columns of the frames differ in length.');
  if (frameBand.length > largestCount)
    throw new RangeError(`A night has at most ${largestCount} frames, not ${frameBand.length}.`);
  for (let m = 0; m < star.length; m += 1) {
    if (star[m]! >= nStars || frame[m]! >= frameBand.length)
      throw new RangeError(`Measurement ${m} names a star or a frame that does not exist.`);
  }
}
