/**
 * A first idea of which rows belong together, found without trusting any of them: least trimmed squares from many small
 * random samples, concentrated, and then Tukey's bisquare.
 *
 * | symbol | name | what it is |
 * |---|---|---|
 * | r | residuals | y − Xβ [mag] |
 * | a | rowSigma | √(σ_i² + τ_s²): what is known of a row's error [mag] |
 * | s | scale | scatter beyond that, such that the median of |r| / √(a² + s²) is 0.6745 [mag] |
 * | h | kept | rows in a concentrated half, (n + p + 1) / 2 |
 *
 * Breakdown: half of the rows, less what determines the coefficients. Known beforehand values enter as rows that are
 * in every sample.
 *
 * Sources: Rousseeuw and Van Driessen 2006, Data Mining and Knowledge Discovery 12, 29 (trimmed squares by
 * concentration); Beaton and Tukey 1974, Technometrics 16, 147 (bisquare); Hampel 1974, Journal of the American
 * Statistical Association 69, 383 (median absolute deviation).
 */
import { applyQTransposed, factorQr, solveR } from '@/lib/numerics/householder-qr';
import { type Prior } from '@/lib/numerics/generalised-least-squares';
import { createRandom, type Random } from '@/lib/numerics/random';

export interface RobustInput {
  /** Column-major, shape (n, p). */
  readonly design: Float64Array;
  readonly columns: number;
  readonly response: Float64Array;
  readonly rowSigma: Float64Array;
  readonly priors: readonly Prior[];
  /** Tuning constant of the bisquare [its scale]. */
  readonly bisquare: number;
  readonly seed: number;
}

export interface RobustFit {
  readonly coefficients: Float64Array;
  /** s [mag] */
  readonly scale: number;
  /** r / √(a² + s²), shape (n) [1] */
  readonly standardised: Float64Array;
  /** Of the bisquare, 0 … 1, shape (n) [1]. */
  readonly weights: Float64Array;
}

/** Half of a normal distribution lies within so many standard deviations. */
const normalQuartile = 0.6744897501960817;
const samples = 500;
/** Rows on which a sample is judged: enough to tell a good one, few enough to be quick. */
const judged = 300;
const concentrated = 10;
const concentrations = 4;
const maxSteps = 30;
const scaleSteps = 4;
/** Change of a step, in the rows' own errors, below which it is the last. */
const stepTolerance = 1e-6;

/** Finds which rows belong together.
 * @param input - design, response, errors, priors, tuning constant and seed
 * @returns coefficients, scale and weights; null where the rows do not determine the coefficients
 * @accuracy deterministic for a seed; the fit is local, and later steps do not rest on its last digits
 * @source see the head */
export function startRobustly(input: RobustInput): RobustFit | null {
  const every = Int32Array.from(input.response, (_, i) => i);
  const plain = solveRows(input, every, null);
  if (plain === null) return null;
  const random = createRandom(input.seed);
  let best: { coefficients: Float64Array; trimmed: number } | null = null;
  for (const candidate of bestSamples(input, random)) {
    const result = concentrate(input, candidate);
    if (result !== null && (best === null || result.trimmed < best.trimmed)) best = result;
  }
  return bisquareSteps(input, best?.coefficients ?? plain);
}

/** y − Xβ of some rows. */
function restOf(
  { design, columns, response }: RobustInput,
  coefficients: Float64Array,
  rows: Int32Array,
): Float64Array {
  const n = response.length;
  const rest = Float64Array.from(rows, (row) => response[row]!);
  for (let j = 0; j < columns; j += 1) {
    const value = coefficients[j]!;
    for (let i = 0; i < rows.length; i += 1) rest[i]! -= value * design[j * n + rows[i]!]!;
  }
  return rest;
}

/** Least squares of some rows, each divided by its error and times the root of its weight, and of the priors' rows. */
function solveRows(
  input: RobustInput,
  rows: Int32Array,
  inverseSigma: Float64Array | null,
): Float64Array | null {
  const { design, columns, response, priors, rowSigma } = input;
  const n = response.length;
  const all = rows.length + priors.length;
  if (all < columns) return null;
  const matrix = new Float64Array(all * columns);
  const right = new Float64Array(all);
  for (let i = 0; i < rows.length; i += 1) {
    const row = rows[i]!;
    // Without a scale an error serves to weigh: 0.01 mag stands for what is not known yet.
    const factor = inverseSigma === null ? 1 / Math.hypot(rowSigma[row]!, unknownScatter) : inverseSigma[i]!;
    right[i] = response[row]! * factor;
    for (let j = 0; j < columns; j += 1) matrix[j * all + i] = design[j * n + row]! * factor;
  }
  for (const [k, { column, value, sigma }] of priors.entries()) {
    right[rows.length + k] = value / sigma;
    matrix[column * all + rows.length + k] = 1 / sigma;
  }
  const qr = factorQr(matrix, all, columns);
  if (qr.rank < columns) return null;
  applyQTransposed(qr, right);
  return solveR(qr, right);
}

/** Scatter of a good night; it only weighs rows against priors before the scatter is known. [mag]; common practice, no source */
const unknownScatter = 0.01;

/** n distinct places of 0 … count − 1. */
function draw(random: Random, count: number, n: number): Int32Array {
  const chosen = new Set<number>();
  while (chosen.size < n) chosen.add(Math.floor(random.uniform() * count));
  return Int32Array.from(chosen);
}

/** The samples under which half of the judged rows lie closest. */
function bestSamples(input: RobustInput, random: Random): Float64Array[] {
  const n = input.response.length;
  const size = Math.max(1, input.columns - new Set(input.priors.map(({ column }) => column)).size);
  const judges = n <= judged ? Int32Array.from(input.response, (_, i) => i) : draw(random, n, judged);
  const half = (judges.length + input.columns + 1) >> 1;
  const found: { coefficients: Float64Array; middle: number }[] = [];
  if (size > n) return [];
  for (let k = 0; k < samples; k += 1) {
    const coefficients = solveRows(input, draw(random, n, size), null);
    if (coefficients === null) continue;
    const sizes = restOf(input, coefficients, judges)
      .map((r, i) => Math.abs(r) / Math.hypot(input.rowSigma[judges[i]!]!, unknownScatter))
      .sort();
    found.push({ coefficients, middle: sizes[Math.min(half, sizes.length) - 1]! });
  }
  found.sort((a, b) => a.middle - b.middle);
  return found.slice(0, concentrated).map(({ coefficients }) => coefficients);
}

/** Refits to the half of the rows that lie closest, again and again: each step lowers their sum of squares. */
function concentrate(
  input: RobustInput,
  start: Float64Array,
): { coefficients: Float64Array; trimmed: number } | null {
  const n = input.response.length;
  const every = Int32Array.from(input.response, (_, i) => i);
  const kept = Math.min(n, (n + input.columns + 1) >> 1);
  let coefficients = start;
  let trimmed = Infinity;
  for (let step = 0; step <= concentrations; step += 1) {
    const sizes = restOf(input, coefficients, every).map(
      (r, i) => Math.abs(r) / Math.hypot(input.rowSigma[i]!, unknownScatter),
    );
    const closest = every.toSorted((a, b) => sizes[a]! - sizes[b]! || a - b).subarray(0, kept);
    trimmed = closest.reduce((sum, row) => sum + sizes[row]! ** 2, 0);
    if (step === concentrations) break;
    const next = solveRows(input, closest, null);
    // Half of the rows may lack what determines a coefficient; then the fit before it stands.
    if (next === null) break;
    coefficients = next;
  }
  return { coefficients, trimmed };
}

/** s such that the median of |r| / √(a² + s²) is about that of a normal distribution. The p smallest are left out: so
 * many rows can be fitted without any residual. */
function robustScale(rest: Float64Array, rowSigma: Float64Array, columns: number): number {
  const known = middleOf(rowSigma, 0) ** 2;
  let s2 = 0;
  for (let step = 0; step < scaleSteps; step += 1) {
    const sizes = rest.map((r, i) => Math.abs(r) / (Math.sqrt(rowSigma[i]! ** 2 + s2) || 1e-12));
    const ratio = middleOf(sizes, Math.min(columns, sizes.length - 1)) / normalQuartile;
    s2 = Math.max(0, (known + s2) * ratio * ratio - known);
  }
  return Math.sqrt(s2);
}

/** Median of all but the smallest `without`. */
function middleOf(values: Float64Array, without: number): number {
  const sorted = values.toSorted();
  const at = without + (sorted.length - without - 1) / 2;
  return (sorted[Math.floor(at)]! + sorted[Math.ceil(at)]!) / 2;
}

function bisquareSteps(input: RobustInput, start: Float64Array): RobustFit {
  const { rowSigma, bisquare, columns } = input;
  const every = Int32Array.from(input.response, (_, i) => i);
  let coefficients = start;
  for (let step = 0; ; step += 1) {
    const rest = restOf(input, coefficients, every);
    const scale = robustScale(rest, rowSigma, columns);
    const errors = rowSigma.map((a) => Math.hypot(a, scale) || 1e-12);
    const standardised = rest.map((r, i) => r / errors[i]!);
    const weights = standardised.map((u) => bisquareWeight(u, bisquare));
    const result: RobustFit = { coefficients, scale, standardised, weights };
    if (step === maxSteps) return result;
    const next = solveRows(
      input,
      every,
      weights.map((w, i) => Math.sqrt(w) / errors[i]!),
    );
    if (next === null) return result;
    const moved = restOf(input, next, every).reduce(
      (most, r, i) => Math.max(most, Math.abs(r - rest[i]!) / errors[i]!),
      0,
    );
    coefficients = next;
    if (moved < stepTolerance) return result;
  }
}

/** Weight of Tukey's bisquare.
 * @param standardised - residual over its scale [1]
 * @param constant - residual from which on a row counts nothing [its scale]
 * @returns weight, 0 … 1 [1]
 * @source Beaton and Tukey 1974, Technometrics 16, 147 */
export function bisquareWeight(standardised: number, constant: number): number {
  const u = standardised / constant;
  return Math.abs(u) >= 1 ? 0 : (1 - u * u) ** 2;
}
