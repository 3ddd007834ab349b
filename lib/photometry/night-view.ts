/**
 * One night of a band seen at given variance components, for asking what single rows and groups of rows differ by from
 * what all others predict. Symbols as in `lib/numerics/mixed-noise`: V is the covariance of the rows, C that of the
 * coefficients, P = V⁻¹ − V⁻¹X C X′V⁻¹.
 *
 * | question | answer | source |
 * |---|---|---|
 * | a row of the fit, taken out of it | (P y)_i / √P_ii | Cook and Weisberg 1982, section 2.2 |
 * | a row outside the fit | e = y − xβ − c′V⁻¹r, var = V_jj − c′V⁻¹c + q′C q, q = x − X′V⁻¹c | Henderson 1975 |
 * | a group of rows that is shifted as a whole | coefficient of one more column, 1 in the group | Cook and Weisberg 1982, mean-shift model |
 *
 * c is the covariance of the row with those of the fit, r the residuals y − Xβ. All three are standard normal at the
 * true components; with estimated ones they follow Student's t as the degrees of freedom allow.
 *
 * Sources: Cook and Weisberg 1982, Residuals and Influence in Regression; Henderson 1975, Biometrics 31, 423.
 */
import { fitWhitened, type Prior } from '@/lib/numerics/generalised-least-squares';
import { inverseR } from '@/lib/numerics/householder-qr';
import {
  type Components,
  factorNoise,
  layoutNoise,
  type Noise,
  solveNoise,
} from '@/lib/numerics/mixed-noise';
import { applyProjection, projectNoise, type Projection } from '@/lib/numerics/noise-traces';
import { designOf, type BandProblem } from './band-problem';

export interface NightView {
  readonly problem: BandProblem;
  /** Rows of the problem that are in the fit, shape (n). */
  readonly rows: Int32Array;
  readonly components: Components;
  readonly priors: readonly Prior[];
  readonly noise: Noise;
  readonly projection: Projection;
  /** X, column-major, shape (n, p). */
  readonly design: Float64Array;
  readonly coefficients: Float64Array;
  /** U with C = U U′, column-major, shape (p, p). */
  readonly inverse: Float64Array;
  /** y − Xβ, shape (n) [mag]. */
  readonly residuals: Float64Array;
  /** P y, shape (n) [1/mag]. */
  readonly v: Float64Array;
}

/** A difference and its standard error [mag]. */
export interface Shift {
  readonly shift: number;
  readonly error: number;
}

/** Frames numbered from 0 in the order in which rows name them.
 * @param problem - of the band
 * @param rows - numbers of rows, shape (m) [1]
 * @returns number of each row's frame, shape (m) [1]
 * @source definition */
export function blocksOf(problem: BandProblem, rows: Int32Array): Int32Array {
  const { frame } = problem;
  const numbers = new Map<number, number>();
  return rows.map((row) => {
    const known = numbers.get(frame[row]!);
    if (known !== undefined) return known;
    numbers.set(frame[row]!, numbers.size);
    return numbers.size - 1;
  });
}

/** Values of some rows.
 * @param values - of all rows, shape (n)
 * @param rows - numbers of rows, shape (m) [1]
 * @returns their values, shape (m)
 * @source definition */
export function pick(values: Float64Array, rows: Int32Array): Float64Array {
  return Float64Array.from(rows, (row) => values[row]!);
}

function noiseOf(problem: BandProblem, rows: Int32Array, components: Components): Noise {
  const layout = layoutNoise({
    sigma: pick(problem.sigma, rows),
    subject: Int32Array.from(rows, (row) => problem.star[row]!),
    subjectSigma: problem.starSigma.map((sigma) => (Number.isFinite(sigma) ? sigma : 0)),
    block: blocksOf(problem, rows),
    elsewhere: null,
  });
  return factorNoise(layout, components);
}

/** Fits one night at given components.
 * @param problem - of the band
 * @param rows - of the night that are in the fit, shape (n) [1]
 * @param components - variances of observation and frame [mag²]
 * @param priors - on the columns of the problem
 * @returns the view; null where the rows do not determine every coefficient
 * @accuracy as the QR
 * @source Aitken 1935, Proceedings of the Royal Society of Edinburgh 55, 42 */
export function viewNight(
  problem: BandProblem,
  rows: Int32Array,
  components: Components,
  priors: readonly Prior[],
): NightView | null {
  const columns = problem.sought.length;
  const noise = noiseOf(problem, rows, components);
  const design = designOf(problem, rows);
  const part = { design, columns, response: pick(problem.response, rows), priors };
  const fit = fitWhitened(noise, part);
  if (fit.qr.rank < columns) return null;
  const inverse = inverseR(fit.qr);
  const rest = part.response;
  for (let j = 0; j < columns; j += 1) {
    for (let i = 0; i < rows.length; i += 1) rest[i]! -= fit.coefficients[j]! * design[j * rows.length + i]!;
  }
  return {
    problem,
    rows,
    components,
    priors,
    noise,
    projection: projectNoise(noise, design, inverse, columns),
    design,
    coefficients: fit.coefficients,
    inverse,
    residuals: rest,
    v: solveNoise(noise, rest),
  };
}

/** What each row of the fit differs by from its prediction by all others.
 * @param view - of the night
 * @param i - place of the row in the view [1]
 * @returns difference and its standard error; an infinite error where the others predict nothing [mag]
 * @accuracy rounding
 * @source Cook and Weisberg 1982, Residuals and Influence in Regression, section 2.2, for correlated errors */
export function deletionOf(view: NightView, i: number): Shift {
  const { projection, v } = view;
  return meanShift(v[i]!, projection.diagonal[i]!, projection.inverseDiagonal[i]!);
}

/** Shift of a group of rows that are all in the fit.
 * @param view - of the night
 * @param places - of the group's rows in the view [1]
 * @returns shift and its standard error; an infinite error where the others predict nothing [mag]
 * @accuracy rounding
 * @source mean-shift model: Cook and Weisberg 1982, Residuals and Influence in Regression, section 2.2 */
export function shiftWithin(view: NightView, places: readonly number[]): Shift {
  const { projection, v, rows } = view;
  const indicator = new Float64Array(rows.length);
  for (const i of places) indicator[i] = 1;
  const projected = applyProjection(projection, indicator);
  let [pull, own, bare] = [0, 0, 0];
  for (const i of places) {
    pull += v[i]!;
    own += projected[i]!;
    bare += projection.inverseDiagonal[i]!;
  }
  return meanShift(pull, own, bare);
}

/** Shifts of all frames that have rows in the fit, each by the sums over its rows that the view holds already.
 * @param view - of the night
 * @returns for the place of each frame its shift and standard error, as `shiftWithin` gives for all its rows [mag]
 * @accuracy rounding
 * @source mean-shift model: Cook and Weisberg 1982, Residuals and Influence in Regression, section 2.2 */
export function frameShifts(view: NightView): ReadonlyMap<number, Shift> {
  const { problem, rows, projection, v } = view;
  const blocks = blocksOf(problem, rows);
  const sums = new Map<number, { block: number; pull: number; bare: number }>();
  for (const [i, row] of rows.entries()) {
    const known = sums.get(problem.frame[row]!) ?? { block: blocks[i]!, pull: 0, bare: 0 };
    known.pull += v[i]!;
    known.bare += projection.inverseDiagonal[i]!;
    sums.set(problem.frame[row]!, known);
  }
  return new Map(
    [...sums].map(([frame, { block, pull, bare }]) => [
      frame,
      meanShift(pull, projection.blockSums[block]!, bare),
    ]),
  );
}

/** The shift of rows over which P y sums to `pull`, P to `own` and the diagonal of V⁻¹ to `bare`. */
function meanShift(pull: number, own: number, bare: number): Shift {
  // Rows that alone determine a coefficient leave rounding here.
  if (!(own > 1e-10 * bare)) return { shift: 0, error: Infinity };
  return { shift: pull / own, error: 1 / Math.sqrt(own) };
}

/** What a row outside the fit differs by from its prediction by those in it.
 * @param view - of the night
 * @param row - of the problem, not in the view [1]
 * @returns difference and the standard error of it, noise of the row included [mag]
 * @accuracy rounding
 * @source Henderson 1975, Biometrics 31, 423 */
export function predictionOf(view: NightView, row: number): Shift {
  const { problem, rows, components, noise, design, coefficients, inverse } = view;
  const tau2 = problem.starSigma[problem.star[row]!]! ** 2;
  const shared = Float64Array.from(
    rows,
    (other) =>
      (problem.frame[other] === problem.frame[row] ? components.block : 0) +
      (problem.star[other] === problem.star[row] ? tau2 : 0),
  );
  const solved = solveNoise(noise, shared);
  const own = designOf(problem, Int32Array.of(row));
  const p = own.length;
  let difference = problem.response[row]!;
  let variance = problem.sigma[row]! ** 2 + components.observation + components.block + tau2;
  const q = own.slice();
  for (let j = 0; j < p; j += 1) {
    difference -= own[j]! * coefficients[j]!;
    for (let i = 0; i < rows.length; i += 1) q[j]! -= design[j * rows.length + i]! * solved[i]!;
  }
  for (let i = 0; i < rows.length; i += 1) {
    difference -= solved[i]! * view.residuals[i]!;
    variance -= solved[i]! * shared[i]!;
  }
  for (let k = 0; k < p; k += 1) {
    let sum = 0;
    for (let j = 0; j < p; j += 1) sum += inverse[k * p + j]! * q[j]!;
    variance += sum * sum;
  }
  return { shift: difference, error: Math.sqrt(variance) };
}

export interface GroupShift extends Shift {
  /** y − Xβ of the group's rows, β being free of the group's shift, shape (m) [mag]. */
  readonly residuals: Float64Array;
}

/** Shift of a group of rows, wherever they stand now: all of them enter, with a column of their own.
 * @param view - of the night
 * @param group - rows of the problem, of this night [1]
 * @returns shift, standard error and the group's residuals; null where the shift cannot be told from the coefficients
 * @accuracy as the QR
 * @source mean-shift model: Cook and Weisberg 1982, Residuals and Influence in Regression, section 2.2 */
export function shiftOfGroup(view: NightView, group: Int32Array): GroupShift | null {
  const { problem, components, priors } = view;
  const members = new Set(group);
  const rows = Int32Array.from(new Set([...view.rows, ...group])).sort();
  const columns = problem.sought.length + 1;
  const plain = designOf(problem, rows);
  const design = new Float64Array(rows.length * columns);
  design.set(plain);
  for (let i = 0; i < rows.length; i += 1) if (members.has(rows[i]!)) design[plain.length + i] = 1;
  const noise = noiseOf(problem, rows, components);
  const part = { design, columns, response: pick(problem.response, rows), priors };
  const fit = fitWhitened(noise, part);
  if (fit.qr.rank < columns) return null;
  const inverse = inverseR(fit.qr);
  let variance = 0;
  for (let k = 0; k < columns; k += 1) variance += inverse[k * columns + columns - 1]! ** 2;
  const own = designOf(problem, group);
  const rest = Float64Array.from(group, (row, i) => {
    let value = problem.response[row]!;
    for (let j = 0; j < columns - 1; j += 1) value -= own[j * group.length + i]! * fit.coefficients[j]!;
    return value;
  });
  return { shift: fit.coefficients[columns - 1]!, error: Math.sqrt(variance), residuals: rest };
}
