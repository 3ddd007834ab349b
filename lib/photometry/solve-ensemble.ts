/**
 * Offsets of frames and magnitudes of stars in one band together, from whichever stars each frame has: weighted least
 * squares, repeated with weights that measurements and stars lose when they disagree.
 *
 *     y_o = e_f + d_s + noise,   d_s ~ N(0, tau_s²)
 *
 * | symbol | name | shape | meaning |
 * |---|---|---|---|
 * | y | y | (n) | instrumental magnitude less all that is known of star and band [mag] |
 * | e | offset | (n frames) | sought [mag] |
 * | d | shift | (n stars) | error of the star's known magnitude [mag] |
 * | tau | tau | (n stars) | its standard error [mag] |
 * | A | matrix | (n frames, n frames) | normal matrix once the stars are eliminated |
 *
 * Frames must be few enough for a matrix of them; stars may be many.
 */
import { factorCholesky, invertCholesky } from '@/lib/numerics/cholesky';
import { bisquareWeight, median, scaleByMad } from '@/lib/numerics/robust';

export interface Ensemble {
  readonly nFrames: number;
  readonly nStars: number;
  /** Shape (n) each. */
  readonly frame: Int32Array;
  readonly star: Int32Array;
  readonly y: Float64Array;
  readonly variance: Float64Array;
  /** Shape (n stars), above zero. */
  readonly tau: Float64Array;
}

export interface EnsembleOptions {
  /** Stars that must agree on a frame [1]. */
  readonly leastStars: number;
  /** Tuning constant of the bisquare [its scale]. */
  readonly bisquare: number;
}

export interface EnsembleSolution {
  /** Shape (n frames); NaN where the frame has too few stars. */
  readonly offset: Float64Array;
  /** Shape (n frames, n frames) row-major [mag²]; rows of frames without offset are zero. */
  readonly covariance: Float64Array;
  /** Stars that agree, shape (n frames). */
  readonly nStars: Uint16Array;
  readonly converged: boolean;
}

/** A change of offsets below which the iteration ends [mag], and the steps after which it is given up. Our own rule. */
const tolerance = 1e-7;
const maxSteps = 100;

interface State {
  readonly offset: Float64Array;
  readonly shift: Float64Array;
  /** Of measurements [1] and of what is known of stars [1], 0 … 1. */
  readonly weight: Float64Array;
  readonly starWeight: Float64Array;
  readonly nStars: Uint16Array;
  /** Factor on the errors of measurements, 1 or more [1]. */
  scale: number;
}

/** Solves an ensemble.
 * @param ensemble - measurements, shape (n) each, and stars, shape (n stars) [mag, mag²]
 * @param options - stars that a frame needs, tuning of the weights
 * @returns offsets with their covariance [mag, mag²]
 * @throws nothing for finite input with positive errors
 * @accuracy offsets 1e-7 mag in the iteration; errors are widened when residuals are wider than stated, never narrowed
 * @source Honeycutt 1992, PASP 104, 435; weights: Beaton and Tukey 1974, Technometrics 16, 147 */
export function solveEnsemble(ensemble: Ensemble, options: EnsembleOptions): EnsembleSolution {
  const state = startingState(ensemble);
  let covariance: Float64Array = new Float64Array(ensemble.nFrames ** 2);
  for (let step = 0; step < maxSteps; step += 1) {
    reweigh(ensemble, options, state);
    const solved = solveWeighted(ensemble, options, state);
    covariance = solved.covariance;
    if (solved.change <= tolerance) return { ...result(state, covariance), converged: true };
  }
  return { ...result(state, covariance), converged: false };
}

const result = (
  { offset, nStars }: State,
  covariance: Float64Array,
): Omit<EnsembleSolution, 'converged'> => ({
  offset,
  covariance,
  nStars,
});

/** Medians: of what the stars say of each frame, then of what the frames say of each star. */
function startingState({ nFrames, nStars, frame, star, y }: Ensemble): State {
  const offset = mediansBy(frame, nFrames, y);
  const left = y.map((value, o) => value - offset[frame[o]!]!);
  return {
    offset,
    shift: mediansBy(star, nStars, left),
    weight: new Float64Array(y.length).fill(1),
    starWeight: new Float64Array(nStars).fill(1),
    nStars: new Uint16Array(nFrames),
    scale: 1,
  };
}

function mediansBy(group: Int32Array, nGroups: number, values: Float64Array): Float64Array {
  const lists = Array.from({ length: nGroups }, (): number[] => []);
  for (let o = 0; o < values.length; o += 1) lists[group[o]!]!.push(values[o]!);
  return Float64Array.from(lists, (list) => (list.length === 0 ? Number.NaN : median(list)));
}

/** Robust standard deviation about zero, not below 1: errors as stated are believed unless residuals are wider. */
const robustScale = (standardised: Float64Array): number =>
  standardised.length === 0 ? 1 : Math.max(1, scaleByMad(standardised, 0));

/** Weights of measurements by their residuals and of stars by their shifts. */
function reweigh(ensemble: Ensemble, { bisquare }: EnsembleOptions, state: State): void {
  const { frame, star, y, variance, tau } = ensemble;
  const { offset, shift, weight, starWeight } = state;
  const standardised = y.map(
    (value, o) => (value - offset[frame[o]!]! - shift[star[o]!]!) / Math.sqrt(variance[o]!),
  );
  state.scale = robustScale(standardised.filter(Number.isFinite));
  for (let o = 0; o < y.length; o += 1) {
    weight[o] = bisquareWeight(standardised[o]! / state.scale, bisquare);
  }
  const shifts = shift.map((d, s) => d / tau[s]!);
  const starScale = robustScale(shifts.filter(Number.isFinite));
  for (let s = 0; s < shift.length; s += 1) {
    starWeight[s] = bisquareWeight(shifts[s]! / starScale, bisquare);
  }
}

/** Least squares with the present weights, in place; the largest change of an offset. */
function solveWeighted(
  ensemble: Ensemble,
  { leastStars }: EnsembleOptions,
  state: State,
): { readonly covariance: Float64Array; readonly change: number } {
  const { nFrames, nStars, frame, star, y, variance, tau } = ensemble;
  const { offset, shift, weight, starWeight } = state;
  // A frame that has lost its offset keeps the number with which it did.
  for (let f = 0; f < nFrames; f += 1) if (!Number.isNaN(offset[f]!)) state.nStars[f] = 0;
  for (let o = 0; o < y.length; o += 1) {
    if (weight[o]! > 0 && starWeight[star[o]!]! > 0) state.nStars[frame[o]!]! += 1;
  }
  const isTied = Array.from(offset, (e, f) => !Number.isNaN(e) && state.nStars[f]! >= leastStars);
  const w = y.map((_, o) => (isTied[frame[o]!]! ? weight[o]! / (variance[o]! * state.scale ** 2) : 0));
  const rowsOf = groupedRows(star, nStars);
  const matrix = new Float64Array(nFrames * nFrames);
  const right = new Float64Array(nFrames);
  for (let s = 0; s < nStars; s += 1) {
    const rows = rowsOf[s]!;
    const { total, mean } = starMean(rows, w, y, starWeight[s]! / tau[s]! ** 2);
    if (total === 0) continue;
    for (const i of rows) {
      const f = frame[i]!;
      right[f]! += w[i]! * (y[i]! - mean);
      matrix[f * nFrames + f]! += w[i]!;
      for (const j of rows) matrix[f * nFrames + frame[j]!]! -= (w[i]! * w[j]!) / total;
    }
  }
  for (let f = 0; f < nFrames; f += 1) if (!isTied[f]!) matrix[f * nFrames + f] = 1;
  factorCholesky(matrix, nFrames);
  const covariance = invertCholesky(matrix, nFrames);
  let change = 0;
  for (let f = 0; f < nFrames; f += 1) {
    let next = 0;
    for (let g = 0; g < nFrames; g += 1) next += covariance[f * nFrames + g]! * right[g]!;
    if (!isTied[f]!) {
      covariance[f * nFrames + f] = 0;
      next = Number.NaN;
    }
    const moved = Math.abs(next - offset[f]!);
    // A frame that is tied no longer has moved as well.
    change = Math.max(change, Number.isNaN(next) === Number.isNaN(offset[f]!) ? moved || 0 : 1);
    offset[f] = next;
  }
  const left = y.map((value, o) => value - offset[frame[o]!]!);
  for (let s = 0; s < nStars; s += 1) {
    const { mean } = starMean(rowsOf[s]!, w, left, starWeight[s]! / tau[s]! ** 2);
    shift[s] = mean;
  }
  return { covariance, change };
}

function groupedRows(star: Int32Array, nStars: number): readonly (readonly number[])[] {
  const rows = Array.from({ length: nStars }, (): number[] => []);
  star.forEach((s, o) => rows[s]!.push(o));
  return rows;
}

/** Weighted mean of a star's values and of zero with the weight of what is known; `total` is the sum of weights. */
function starMean(
  rows: readonly number[],
  w: Float64Array,
  values: Float64Array,
  known: number,
): { readonly total: number; readonly mean: number } {
  let total = known;
  let sum = 0;
  for (const o of rows) {
    if (w[o]! === 0) continue;
    total += w[o]!;
    sum += w[o]! * values[o]!;
  }
  return { total, mean: total === 0 ? 0 : sum / total };
}
