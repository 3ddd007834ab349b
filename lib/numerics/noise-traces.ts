/**
 * What the components' equations need of P = V⁻¹ − V⁻¹X C X′V⁻¹ without forming it: its diagonal and its sums over
 * blocks, at a cost of one pass over the pairs within each block. Symbols as in `mixed-noise`; C = U U′ is the
 * coefficients' covariance, G = V⁻¹X.
 */
import { invertCholesky } from './cholesky';
import { type Noise, solveNoise } from './mixed-noise';

export interface Projection {
  readonly noise: Noise;
  /** G U, column-major, shape (n, rank): P = V⁻¹ − (G U)(G U)′. */
  readonly explained: Float64Array;
  readonly rank: number;
  /** Diagonal of V⁻¹ and of P, shape (n). */
  readonly inverseDiagonal: Float64Array;
  readonly diagonal: Float64Array;
  /** 1′P 1 over the rows of each block, shape (blocks). */
  readonly blockSums: Float64Array;
}

/** Diagonal of V⁻¹ and the sum of its numbers within each block. */
function inverseSums(noise: Noise): { diagonal: Float64Array; sums: Float64Array } {
  const { layout, precision, kappa, lower } = noise;
  const { rowsByBlock, blockStart, slot, slotTau } = layout;
  const slots = slotTau.length;
  const inverse = invertCholesky(lower, slots);
  const diagonal = new Float64Array(layout.rows);
  const sums = new Float64Array(kappa.length);
  for (let b = 0; b < kappa.length; b += 1) {
    const from = blockStart[b]!;
    const to = blockStart[b + 1]!;
    const k = kappa[b]!;
    const total = noise.blockPrecision[b]!;
    // N = S T½ M⁻¹ T½ S′ on this block's rows; V⁻¹ = A₀⁻¹ − A₀⁻¹ N A₀⁻¹ and A₀⁻¹ = E − κ p p′, p the precisions.
    const np = new Float64Array(to - from);
    let pnp = 0;
    for (let at = from; at < to; at += 1) {
      const i = rowsByBlock[at]!;
      const s = slot[i]!;
      if (s < 0) continue;
      let sum = 0;
      for (let other = from; other < to; other += 1) {
        const j = rowsByBlock[other]!;
        const t = slot[j]!;
        if (t >= 0) sum += inverse[s * slots + t]! * slotTau[t]! * precision[j]!;
      }
      np[at - from] = slotTau[s]! * sum;
      pnp += precision[i]! * np[at - from]!;
    }
    for (let at = from; at < to; at += 1) {
      const i = rowsByBlock[at]!;
      const s = slot[i]!;
      const p = precision[i]!;
      const own = s < 0 ? 0 : slotTau[s]! * slotTau[s]! * inverse[s * slots + s]!;
      diagonal[i] = p - p * p * (k + own - 2 * k * np[at - from]! + k * k * pnp);
    }
    const rest = 1 - k * total;
    sums[b] = total * rest - rest * rest * pnp;
  }
  return { diagonal, sums };
}

/** The projection that takes the fit out of V⁻¹.
 * @param noise - the factor of V
 * @param design - column-major, shape (n, columns) [any]
 * @param inverse - U with C = U U′, column-major, shape (columns, rank) [any]
 * @param rank - columns of U [1]
 * @returns diagonal and block sums of P
 * @accuracy as the noise's factor
 * @source Harville 1977, Journal of the American Statistical Association 72, 320 */
export function projectNoise(
  noise: Noise,
  design: Float64Array,
  inverse: Float64Array,
  rank: number,
): Projection {
  const rows = noise.layout.rows;
  const { rowsByBlock, blockStart } = noise.layout;
  const columns = rank === 0 ? 0 : inverse.length / rank;
  const explained = new Float64Array(rows * rank);
  const combination = new Float64Array(rows);
  const { diagonal: inverseDiagonal, sums: blockSums } = inverseSums(noise);
  const diagonal = inverseDiagonal.slice();
  for (let k = 0; k < rank; k += 1) {
    combination.fill(0);
    for (let j = 0; j < columns; j += 1) {
      const factor = inverse[k * columns + j]!;
      if (factor === 0) continue;
      for (let i = 0; i < rows; i += 1) combination[i]! += factor * design[j * rows + i]!;
    }
    const column = solveNoise(noise, combination);
    explained.set(column, k * rows);
    for (let i = 0; i < rows; i += 1) diagonal[i]! -= column[i]! * column[i]!;
    for (let b = 0; b < blockSums.length; b += 1) {
      let sum = 0;
      for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) sum += column[rowsByBlock[at]!]!;
      blockSums[b]! -= sum * sum;
    }
  }
  return { noise, explained, rank, inverseDiagonal, diagonal, blockSums };
}

/** P q.
 * @param projection - P
 * @param q - shape (n) [any]
 * @returns P q, shape (n) [any per unit²]
 * @accuracy as the noise's factor
 * @source Harville 1977, Journal of the American Statistical Association 72, 320 */
export function applyProjection(projection: Projection, q: Float64Array): Float64Array {
  const { noise, explained, rank } = projection;
  const rows = noise.layout.rows;
  const x = solveNoise(noise, q);
  for (let k = 0; k < rank; k += 1) {
    let dot = 0;
    for (let i = 0; i < rows; i += 1) dot += explained[k * rows + i]! * q[i]!;
    for (let i = 0; i < rows; i += 1) x[i]! -= dot * explained[k * rows + i]!;
  }
  return x;
}

/** F F′ v: every row gets the sum of its block.
 * @param noise - whose blocks
 * @param v - shape (n) [any]
 * @returns sums, shape (n) [any]
 * @accuracy rounding
 * @source from memory: the derivative of V by the blocks' variance is F F′ */
export function spreadBlockSums(noise: Noise, v: Float64Array): Float64Array {
  const { layout, kappa } = noise;
  const { rowsByBlock, blockStart } = layout;
  const spread = new Float64Array(v.length);
  for (let b = 0; b < kappa.length; b += 1) {
    let sum = 0;
    for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) sum += v[rowsByBlock[at]!]!;
    for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) spread[rowsByBlock[at]!] = sum;
  }
  return spread;
}
