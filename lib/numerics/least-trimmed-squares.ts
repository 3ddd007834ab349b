/**
 * A start for regression that nearly half of the rows may spoil: least trimmed squares, the coefficients for which the
 * sum of the h smallest squared residuals is least, h being just over half of the rows.
 *
 * Many small random subsets each give coefficients; a concentration step refits to the h rows that these fit best, which
 * can only lower the sum. Two steps for every subset, two more for the ten best, and the two best of these are followed
 * to the end. Where rows are many, the subsets and their steps are tried on a random part of them.
 *
 * Source: Rousseeuw and Van Driessen 2006, Data Mining and Knowledge Discovery 12, 29.
 */
import { applyQTransposed, factorQr, inseparableColumns, solveR } from './householder-qr';
import { type Random } from './random';
import { madPerSigma, median } from './robust';

export interface TrimmedInput {
  /** Column-major, rows divided by their errors, shape (n, p). */
  readonly design: Float64Array;
  /** p */
  readonly columns: number;
  /** Divided by the errors, shape (n). */
  readonly response: Float64Array;
  /** 1 for rows that are no observations but priors: they are in every subset and are never trimmed. Shape (n), or null. */
  readonly anchored: Uint8Array | null;
  /** Random subsets to try; 500 fail to hold one good subset of 6 rows less than once in 10³ at 30 % of outliers. */
  readonly subsets: number;
  readonly random: Random;
}

export interface TrimmedFit {
  readonly kind: 'determined';
  readonly coefficients: Float64Array;
  /** 1.4826 (1 + 5 / (n − p)) √median r², n without priors, in units of the rows' errors [1]. */
  readonly scale: number;
}

export interface UndeterminedTrimmed {
  readonly kind: 'undetermined';
  /** Sets of columns that all rows together, or the best half of them, cannot tell apart. */
  readonly dependent: readonly (readonly number[])[];
}

/** Rows above which subsets are tried on a part of them. */
const partSize = 600;
const promising = 10;
const followed = 2;
const maxSteps = 100;

interface Candidate {
  readonly coefficients: Float64Array;
  readonly objective: number;
}

/** The rows that may be trimmed, and those that may not. */
interface Pool {
  readonly free: Int32Array;
  readonly anchored: Int32Array;
  readonly keep: number;
}

function fitRows({ design, columns, response }: TrimmedInput, rows: Int32Array) {
  const n = response.length;
  const part = new Float64Array(rows.length * columns);
  for (let j = 0; j < columns; j += 1) {
    for (let k = 0; k < rows.length; k += 1) part[j * rows.length + k] = design[j * n + rows[k]!]!;
  }
  const y = Float64Array.from(rows, (i) => response[i]!);
  const qr = factorQr(part, rows.length, columns);
  applyQTransposed(qr, y);
  return { qr, coefficients: solveR(qr, y) };
}

function squaredResidual(
  { design, columns, response }: TrimmedInput,
  coefficients: Float64Array,
  i: number,
): number {
  let rest = response[i]!;
  for (let j = 0; j < columns; j += 1) rest -= coefficients[j]! * design[j * response.length + i]!;
  return rest * rest;
}

const join = (one: Int32Array, other: Int32Array): Int32Array => Int32Array.from([...one, ...other]);

/** One concentration step: the rows that fit best, and the fit to these; null when they do not determine it. */
function concentrate(input: TrimmedInput, pool: Pool, coefficients: Float64Array): Candidate | null {
  const { free, anchored, keep } = pool;
  const squares = new Float64Array(free.length);
  for (let k = 0; k < free.length; k += 1) squares[k] = squaredResidual(input, coefficients, free[k]!);
  const limit = squares.slice().sort()[keep - 1]!;
  let below = 0;
  for (const square of squares) if (square < limit) below += 1;
  // Of rows that are equal at the limit the first come in.
  let room = keep - below;
  const rows = new Int32Array(keep + anchored.length);
  let at = 0;
  for (let k = 0; k < free.length; k += 1) {
    if (squares[k]! > limit || (squares[k] === limit && room === 0)) continue;
    if (squares[k] === limit) room -= 1;
    rows[at] = free[k]!;
    at += 1;
  }
  rows.set(anchored, at);
  const fit = fitRows(input, rows);
  if (fit.qr.rank < input.columns) return null;
  let objective = 0;
  for (const i of rows) objective += squaredResidual(input, fit.coefficients, i);
  return { coefficients: fit.coefficients, objective };
}

/** Brings `count` random rows to the front. */
function draw(rows: Int32Array, count: number, random: Random): void {
  for (let k = 0; k < count; k += 1) {
    const other = k + Math.floor(random.uniform() * (rows.length - k));
    [rows[k], rows[other]] = [rows[other]!, rows[k]!];
  }
}

/** Coefficients through as few random rows as determine them; null when all rows together do not. */
function elemental(input: TrimmedInput, pool: Pool, shuffled: Int32Array): Float64Array | null {
  const { columns, random } = input;
  const size = Math.max(1, columns - pool.anchored.length);
  for (let count = Math.min(size, shuffled.length); ; count = Math.min(shuffled.length, 2 * count)) {
    draw(shuffled, count, random);
    const fit = fitRows(input, join(shuffled.subarray(0, count), pool.anchored));
    if (fit.qr.rank === columns) return fit.coefficients;
    if (count === shuffled.length) return null;
  }
}

const keepOf = (rows: number, columns: number): number => Math.min(rows, (rows + columns + 1) >> 1);

/** The best candidates of all subsets, best first. */
function tryParts(input: TrimmedInput, pool: Pool): readonly Candidate[] {
  const best: Candidate[] = [];
  const shuffled = pool.free.slice();
  for (let subset = 0; subset < input.subsets; subset += 1) {
    const start = elemental(input, pool, shuffled);
    if (start === null) continue;
    const once = concentrate(input, pool, start);
    const twice = once === null ? null : concentrate(input, pool, once.coefficients);
    if (twice === null) continue;
    if (best.length < promising || twice.objective < best[best.length - 1]!.objective) {
      best.push(twice);
      best.sort((a, b) => a.objective - b.objective);
      best.length = Math.min(best.length, promising);
    }
  }
  return best;
}

/** Concentrates until the sum no longer falls, or so many times. */
function follow(input: TrimmedInput, pool: Pool, from: Float64Array, steps: number): Candidate | null {
  let current = concentrate(input, pool, from);
  for (let step = 0; current !== null && step < steps; step += 1) {
    const next = concentrate(input, pool, current.coefficients);
    if (next === null || !(next.objective < current.objective)) break;
    current = next;
  }
  return current;
}

/** Least trimmed squares.
 * @param input - rows divided by their errors, number of subsets and the generator they are drawn from
 * @returns coefficients that outliers in up to nearly half of the rows do not move far, or the columns that cannot be
 * told apart
 * @throws {RangeError} when shapes do not agree, a number is not finite or every row is a prior
 * @accuracy the least sum found, not proven least; the same for the same generator. Efficiency is low: it is a start
 * @source Rousseeuw and Van Driessen 2006, Data Mining and Knowledge Discovery 12, 29; scale: Rousseeuw and Leroy 1987,
 * Robust Regression and Outlier Detection, section 5.1 */
export function fitTrimmed(input: TrimmedInput): TrimmedFit | UndeterminedTrimmed {
  const { columns, response, design, random } = input;
  const n = response.length;
  if (design.length !== n * columns)
    throw new RangeError(`The design does not have ${n} × ${columns} numbers.`);
  if (!response.every(Number.isFinite)) throw new RangeError('A number is not finite.');
  const all = Int32Array.from({ length: n }, (_, i) => i);
  const whole = fitRows(input, all);
  if (whole.qr.rank < columns) return { kind: 'undetermined', dependent: inseparableColumns(whole.qr) };
  const anchored = all.filter((i) => input.anchored?.[i] === 1);
  const free = all.filter((i) => input.anchored?.[i] !== 1);
  const pool: Pool = { free, anchored, keep: keepOf(free.length, columns) };
  let part = pool;
  if (free.length > partSize) {
    const shuffled = free.slice();
    draw(shuffled, partSize, random);
    part = { free: shuffled.slice(0, partSize), anchored, keep: keepOf(partSize, columns) };
  }
  const advanced = tryParts(input, part)
    .map(({ coefficients }) => follow(input, pool, coefficients, 1))
    .filter((candidate) => candidate !== null)
    .sort((a, b) => a.objective - b.objective);
  const ends = advanced
    .slice(0, followed)
    .map((candidate) => follow(input, pool, candidate.coefficients, maxSteps) ?? candidate)
    .sort((a, b) => a.objective - b.objective);
  const best = ends[0] ?? null;
  if (best === null) {
    // No half of the rows determines the coefficients, though all together do.
    return { kind: 'undetermined', dependent: [Array.from({ length: columns }, (_, j) => j)] };
  }
  const { coefficients } = best;
  const square = median(Float64Array.from(free, (i) => squaredResidual(input, coefficients, i)));
  const small = 1 + 5 / Math.max(1, free.length - columns);
  return { kind: 'determined', coefficients, scale: small * (Math.sqrt(square) / madPerSigma) };
}
