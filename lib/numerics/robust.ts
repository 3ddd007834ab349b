/**
 * Regression that outliers do not decide: M-estimates by iteratively reweighted least squares.
 *
 * | symbol | name | meaning |
 * |---|---|---|
 * | r | residuals | response − design × coefficients, rows divided by their errors |
 * | s | scale | median |r| / 0.6744897501960817, taken about zero, or held |
 * | z | | r / s |
 * | w | weights | Tukey's bisquare: (1 − (z/c)²)² for |z| ≤ c, else 0 |
 *
 * There may be several solutions, and which is found depends on the start: it wants one that outliers have not moved
 * (`least-trimmed-squares`).
 */
import { applyQTransposed, factorQr, inseparableColumns, solveR } from './householder-qr';

/** Median absolute deviation of a normal distribution, in standard deviations. [1] */
export const madPerSigma = 0.6744897501960817;

/** From the residuals at each step, or believed as given (1 where the errors are believed). */
export type RobustScale = { readonly kind: 'mad' } | { readonly kind: 'held'; readonly value: number };

export interface RobustInput {
  /** Column-major, rows divided by their errors, shape (n, p). */
  readonly design: Float64Array;
  /** p */
  readonly columns: number;
  /** Divided by the errors, shape (n). */
  readonly response: Float64Array;
  /** c [scale]. */
  readonly bisquare: number;
  readonly scale: RobustScale;
  /** Coefficients to start from, shape (p); null for those of least squares. */
  readonly start: Float64Array | null;
  /** 1 for rows that are no observations but priors: they keep their weight and have no say in the scale. Shape (n), or
   * null for none. */
  readonly anchored: Uint8Array | null;
}

export interface RobustFit {
  readonly kind: 'determined';
  readonly coefficients: Float64Array;
  /** s, in units of the rows' errors [1]. */
  readonly scale: number;
  /** w, 0 … 1, shape (n). */
  readonly weights: Float64Array;
  /** r, shape (n). */
  readonly residuals: Float64Array;
  /** 'exact-fit': more than half of the rows have no residual, and there is no scale to weigh the others by. */
  readonly termination: {
    readonly reason: 'converged' | 'exact-fit' | 'iteration-limit';
    readonly iterations: number;
  };
}

export interface UndeterminedRobust {
  readonly kind: 'undetermined';
  /** Sets of columns that the rows with weight cannot tell apart. */
  readonly dependent: readonly (readonly number[])[];
}

const maxIterations = 500;
/** Change of a fitted value, in units of the scale, that ends the iteration. [1] */
const changeTolerance = 1e-10;
/** Share of the largest response below which a scale is rounding. [1] */
const scaleFloor = 1e-13;

/** Middle value; the mean of the two middle ones for an even number.
 * @param values - shape (n), n ≥ 1, not NaN [any]
 * @returns median [any]
 * @throws {RangeError} when there are no values
 * @accuracy exact
 * @source definition */
export function median(values: ArrayLike<number>): number {
  if (values.length === 0) throw new RangeError('Nothing has no median.');
  const sorted = Float64Array.from(values).sort();
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

/** Standard deviation of normal values from the median of their distances from a centre.
 * @param values - shape (n), n ≥ 1 [any]
 * @param centre - their median, or zero for residuals [any]
 * @returns median |value − centre| / 0.6744897501960817 [any]
 * @throws {RangeError} when there are no values
 * @accuracy exact; the estimate itself has 37 % of the efficiency of the standard deviation
 * @source Hampel 1974, Journal of the American Statistical Association 69, 383 */
export function scaleByMad(values: ArrayLike<number>, centre: number): number {
  return median(Float64Array.from(values, (value) => Math.abs(value - centre))) / madPerSigma;
}

/** Tukey's bisquare.
 * @param z - residual in units of the scale [1]
 * @param c - tuning constant [scale]
 * @returns weight, 0 … 1; 0 for what is not a number
 * @accuracy rounding
 * @source Beaton and Tukey 1974, Technometrics 16, 147 */
export function bisquareWeight(z: number, c: number): number {
  return Math.abs(z) <= c ? (1 - (z / c) ** 2) ** 2 : 0;
}

function residualsOf({ design, columns, response }: RobustInput, coefficients: Float64Array): Float64Array {
  const rest = Float64Array.from(response);
  const rows = rest.length;
  for (let j = 0; j < columns; j += 1) {
    for (let i = 0; i < rows; i += 1) rest[i]! -= coefficients[j]! * design[j * rows + i]!;
  }
  return rest;
}

/** Weighted least squares with weights that may be zero; the sets of columns when these leave too little. */
function solveWeighted(
  { design, columns, response }: RobustInput,
  weights: Float64Array,
): Float64Array | UndeterminedRobust {
  const rows = response.length;
  const roots = weights.map(Math.sqrt);
  const qr = factorQr(
    design.map((value, at) => value * roots[at % rows]!),
    rows,
    columns,
  );
  const dependent = inseparableColumns(qr);
  if (dependent.length > 0) return { kind: 'undetermined', dependent };
  const y = response.map((value, i) => value * roots[i]!);
  applyQTransposed(qr, y);
  return solveR(qr, y);
}

/** M-estimate of linear regression.
 * @param input - rows divided by their errors, tuning constant, scale and start
 * @returns coefficients, scale and weights, or the columns that the rows with weight cannot tell apart
 * @throws {RangeError} when shapes do not agree or a number is not finite
 * @accuracy 1e-8 relative against the solution of the estimating equations; of several, the one that the start
 * leads to
 * @source Huber 1981, Robust Statistics, chapter 7; Beaton and Tukey 1974, Technometrics 16, 147 (bisquare); Holland and
 * Welsch 1977, Communications in Statistics A 6, 813 (reweighting) */
export function fitRobust(input: RobustInput): RobustFit | UndeterminedRobust {
  const { response, design, columns, bisquare, scale: rule, anchored } = input;
  const rows = response.length;
  if (design.length !== rows * columns)
    throw new RangeError(`The design does not have ${rows} × ${columns} numbers.`);
  if (!response.every(Number.isFinite)) throw new RangeError('A number is not finite.');
  let weights = new Float64Array(rows).fill(1);
  const first = input.start ?? solveWeighted(input, weights);
  if ('kind' in first) return first;
  let coefficients = first;
  let residuals = residualsOf(input, coefficients);
  const floor = scaleFloor * response.reduce((most, y) => Math.max(most, Math.abs(y)), 0);
  const free = (values: Float64Array): Float64Array =>
    anchored === null ? values : values.filter((_, i) => anchored[i] === 0);
  const scaleOf = (values: Float64Array): number =>
    rule.kind === 'held' ? rule.value : scaleByMad(free(values), 0);
  let scale = scaleOf(residuals);
  for (let iterations = 0; iterations < maxIterations; iterations += 1) {
    const s = scale;
    if (!(s > floor)) {
      return {
        kind: 'determined',
        coefficients,
        scale: s,
        weights,
        residuals,
        termination: { reason: 'exact-fit', iterations },
      };
    }
    weights = residuals.map((r, i) => (anchored?.[i] === 1 ? 1 : bisquareWeight(r / s, bisquare)));
    const next = solveWeighted(input, weights);
    if ('kind' in next) return next;
    const after = residualsOf(input, next);
    const change = after.reduce((most, r, i) => Math.max(most, Math.abs(r - residuals[i]!)), 0);
    coefficients = next;
    residuals = after;
    scale = scaleOf(residuals);
    if (change <= changeTolerance * s) {
      return {
        kind: 'determined',
        coefficients,
        scale,
        weights,
        residuals,
        termination: { reason: 'converged', iterations: iterations + 1 },
      };
    }
  }
  return {
    kind: 'determined',
    coefficients,
    scale,
    weights,
    residuals,
    termination: { reason: 'iteration-limit', iterations: maxIterations },
  };
}
