/**
 * What one group's rows do to the solution of `block-elimination`: how the coefficients move with each response, the
 * diagonal and block sums of P = V⁻¹ − V⁻¹X C X′V⁻¹ over the group's rows, and the covariance of its coefficients.
 *
 * | symbol | name | shape | meaning |
 * |---|---|---|---|
 * | t | left | (seen)(n) | what β_k leaves of u's columns: P_k S T½ |
 * | W | seenInverse | (seen, seen) | M⁻¹ at the subjects that the group saw |
 * | ∂γ | sharedGradient | (q)(n) | change of γ with each response |
 * | z | sharedLeft | (q)(n) | what β_k and u leave of γ's columns, in units in which γ is uncorrelated |
 * | U | inverse | (p, p) | root of what the covariance of β_k would be without the border |
 *
 * Symbols of the border as in `block-elimination`.
 */
import { borderColumn, type Elimination, groupWithoutBorder, reduceForGroup } from './block-elimination';
import { inverseR, solveR } from './householder-qr';
import { type Noise } from './mixed-noise';
import { applyProjection, type Projection, projectNoise } from './noise-traces';

export interface GroupSensitivity {
  /** P_k, which knows nothing of the border: all of P for a single group without shared columns. */
  readonly alone: Projection;
  /** Covariance of (β_k, γ), row-major, shape (p + q, p + q). */
  readonly covariance: Float64Array;
  /** Change of (β_k, γ) with each response, column-major, shape (n, p + q). */
  readonly gradient: Float64Array;
  /** Diagonal of P, shape (n). */
  readonly diagonal: Float64Array;
  /** 1′P 1 over the rows of each block, shape (blocks). */
  readonly blockSums: Float64Array;
}

/** target + factor × source, in place. */
function addTimes(target: Float64Array, factor: number, source: Float64Array): void {
  if (factor !== 0) for (let i = 0; i < target.length; i += 1) target[i]! += factor * source[i]!;
}

/** Σ_k factors[k] × columns[k], shape (n). */
function combine(
  columns: readonly Float64Array[],
  factors: (k: number) => number,
  rows: number,
): Float64Array {
  const sum = new Float64Array(rows);
  for (const [k, column] of columns.entries()) addTimes(sum, factors(k), column);
  return sum;
}

/** Sums over the rows of each block.
 * @param noise - whose blocks
 * @param v - shape (n) [any]
 * @returns sums, shape (blocks) [any]
 * @accuracy rounding
 * @source definition */
export function sumOverBlocks(noise: Noise, v: Float64Array): Float64Array {
  const { rowsByBlock, blockStart } = noise.layout;
  const sums = new Float64Array(blockStart.length - 1);
  for (let b = 0; b < sums.length; b += 1) {
    for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) sums[b]! += v[rowsByBlock[at]!]!;
  }
  return sums;
}

/** The sensitivities of group k.
 * @param elimination - the solution
 * @param k - which group
 * @returns covariance, gradient and the projection's diagonal and block sums
 * @accuracy as the elimination
 * @source Harville 1977, Journal of the American Statistical Association 72, 320 (P); Björck 1996, Numerical Methods for
 * Least Squares Problems, section 6.3 (covariance by blocks) */
export function senseGroup(elimination: Elimination, k: number): GroupSensitivity {
  const { input, borderInverse, borderShares } = elimination;
  const group = input.groups[k]!;
  const { qr, seen, heads } = elimination.groups[k]!;
  const rows = group.noise.layout.rows;
  const size = input.borderTau.length;
  const p = group.own.columns;
  const q = input.sharedColumns;
  const inverse = inverseR(qr);
  const alone = projectNoise(group.noise, group.own.design, inverse, p);
  const left = seen.map((s) => applyProjection(alone, borderColumn(group, s, input.borderTau[s]!)));
  const seenInverse = Float64Array.from(seen.flatMap((s) => seen.map((t) => borderInverse[s * size + t]!)));
  const remaining = Array.from({ length: q }, (_, j) =>
    groupWithoutBorder(group, input.borderTau, {
      v: group.shared.subarray(j * rows, (j + 1) * rows),
      u: borderShares.subarray(j * size, (j + 1) * size),
    }),
  );
  const sharedRoot = inverseR(elimination.qr);
  const projected = remaining.map((column) => applyProjection(alone, column));
  const sharedLeft = projected.map((_, c) => combine(projected, (j) => sharedRoot[c * q + j]!, rows));
  const sharedGradient = sharedLeft.map((_, j) => combine(sharedLeft, (c) => sharedRoot[c * q + j]!, rows));

  const byBorder = heads.map((head) => solveR(qr, head));
  const byShared = remaining.map((column) => solveR(qr, reduceForGroup(group, qr, column)));
  const gradient = new Float64Array(rows * (p + q));
  for (let j = 0; j < p; j += 1) {
    const column = gradient.subarray(j * rows, (j + 1) * rows);
    for (let c = 0; c < p; c += 1)
      addTimes(column, inverse[c * p + j]!, alone.explained.subarray(c * rows, (c + 1) * rows));
    const pull = Float64Array.from(byBorder, (direction) => -direction[j]!);
    const weights = timesSymmetric(seenInverse, pull);
    for (const [s, factor] of weights.entries()) addTimes(column, factor, left[s]!);
    for (const [m, direction] of byShared.entries()) addTimes(column, -direction[j]!, sharedGradient[m]!);
  }
  for (let m = 0; m < q; m += 1) gradient.set(sharedGradient[m]!, (p + m) * rows);

  // Each root's columns, stacked over (β_k, γ), are independent pieces of the covariance: C = Σ piece · weight · piece′.
  const covariance = new Float64Array((p + q) ** 2);
  addOuter(covariance, rootColumns(inverse, p, p + q));
  addOuter(covariance, sharedPieces(sharedRoot, byShared, p));
  addBorderCovariance(covariance, { byBorder, seenInverse, width: p + q });

  const diagonal = alone.diagonal.slice();
  const blockSums = alone.blockSums.slice();
  const sumsOf = (columns: readonly Float64Array[]) => columns.map((v) => sumOverBlocks(group.noise, v));
  subtractQuadratic(diagonal, left, seenInverse);
  subtractQuadratic(blockSums, sumsOf(left), seenInverse);
  subtractSquares(diagonal, sharedLeft);
  subtractSquares(blockSums, sumsOf(sharedLeft));
  return { alone, covariance, gradient, diagonal, blockSums };
}

/** The columns of U, with zeros for γ. */
function rootColumns(inverse: Float64Array, p: number, width: number): Float64Array[] {
  return Array.from({ length: p }, (_, c) => {
    const piece = new Float64Array(width);
    piece.set(inverse.subarray(c * p, (c + 1) * p));
    return piece;
  });
}

/** The columns of γ's root, with what β_k follows of each. */
function sharedPieces(root: Float64Array, byShared: readonly Float64Array[], p: number): Float64Array[] {
  const q = byShared.length;
  return byShared.map((_, c) => {
    const piece = new Float64Array(p + q);
    for (let m = 0; m < q; m += 1) {
      const factor = root[c * q + m]!;
      piece[p + m] = factor;
      for (let j = 0; j < p; j += 1) piece[j]! -= factor * byShared[m]![j]!;
    }
    return piece;
  });
}

function addOuter(covariance: Float64Array, pieces: readonly Float64Array[]): void {
  for (const piece of pieces) {
    const width = piece.length;
    for (let i = 0; i < width; i += 1) {
      for (let j = 0; j < width; j += 1) covariance[i * width + j]! += piece[i]! * piece[j]!;
    }
  }
}

interface BorderCovariance {
  readonly byBorder: readonly Float64Array[];
  readonly seenInverse: Float64Array;
  readonly width: number;
}

/** What the uncertainty of u adds to β_k. */
function addBorderCovariance(covariance: Float64Array, border: BorderCovariance): void {
  const { byBorder, seenInverse, width } = border;
  const seen = byBorder.length;
  for (const [a, one] of byBorder.entries()) {
    for (const [b, other] of byBorder.entries()) {
      const weight = seenInverse[a * seen + b]!;
      for (let i = 0; i < one.length; i += 1) {
        for (let j = 0; j < one.length; j += 1) covariance[i * width + j]! += weight * one[i]! * other[j]!;
      }
    }
  }
}

/** W v for a symmetric W, row-major, shape (m, m). */
function timesSymmetric(matrix: Float64Array, v: Float64Array): Float64Array {
  const m = v.length;
  return v.map((_, a) => {
    let sum = 0;
    for (let b = 0; b < m; b += 1) sum += matrix[a * m + b]! * v[b]!;
    return sum;
  });
}

/** Takes x′W x off each number of target, x being its place in all columns; W symmetric, row-major, shape (m, m). */
function subtractQuadratic(
  target: Float64Array,
  columns: readonly Float64Array[],
  matrix: Float64Array,
): void {
  const m = columns.length;
  const x = new Float64Array(m);
  for (let i = 0; i < target.length; i += 1) {
    for (let a = 0; a < m; a += 1) x[a] = columns[a]![i]!;
    let sum = 0;
    for (let a = 0; a < m; a += 1) {
      let below = 0;
      for (let b = 0; b < a; b += 1) below += matrix[a * m + b]! * x[b]!;
      sum += x[a]! * (2 * below + matrix[a * m + a]! * x[a]!);
    }
    target[i]! -= sum;
  }
}

/** Takes the square of each column's number off the target's. */
function subtractSquares(target: Float64Array, columns: readonly Float64Array[]): void {
  for (const column of columns) for (let i = 0; i < target.length; i += 1) target[i]! -= column[i]! ** 2;
}
