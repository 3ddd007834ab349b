/**
 * The covariance of one group's observations, and a square root of its inverse, without an n × n matrix:
 *
 *     A = D + σ_b² F F′ + S T S′
 *
 * | symbol | name | shape | meaning |
 * |---|---|---|---|
 * | D | variance | (n) | σ_i² + σ_o², and τ² of a subject that is seen once |
 * | F | block | (n, blocks) | which block a row belongs to; σ_b² is what the rows of a block share |
 * | S, T | slot, tau | (n, slots) | which subject a row belongs to, and its variance τ² |
 * | w² | precision | (n) | 1 / D |
 * | κ | kappa | (blocks) | σ_b² / (1 + σ_b² Σ w²): blocks are eliminated one rank at a time |
 * | M = L L′ | lower | (slots, slots) | I + T½ S′ A₀⁻¹ S T½ with A₀ = D + σ_b² F F′ |
 *
 * With W A₀ W′ = I and B = W S T½ the root of A⁻¹ is H = (I − B (L (I + L′))⁻¹ B′) W: H A H′ = I. It is Andrews' square
 * root for a correction of low rank (Andrews 1968, AIAA Journal 6, 1165).
 */
import { factorCholesky, logDeterminant, solveLower, solveLowerTransposed } from './cholesky';

/** Who shares what with whom; it does not change while the components are sought. */
export interface NoiseLayout {
  readonly rows: number;
  /** σ_i² plus what a subject seen once adds, shape (n). */
  readonly knownVariance: Float64Array;
  /** Rows sorted by block, and where each block begins: shapes (n) and (blocks + 1). */
  readonly rowsByBlock: Int32Array;
  readonly blockStart: Int32Array;
  /** Whether the rows of a block share an effect. */
  readonly hasBlocks: boolean;
  /** Place of a row's subject among those eliminated here, −1 for none: shape (n). */
  readonly slot: Int32Array;
  /** Their standard deviations, shape (slots). */
  readonly slotTau: Float64Array;
}

export interface Components {
  /** σ_o² [unit²] */
  readonly observation: number;
  /** σ_b² [unit²] */
  readonly block: number;
}

export interface Noise {
  readonly layout: NoiseLayout;
  readonly components: Components;
  /** 1 / D, shape (n). */
  readonly precision: Float64Array;
  /** Σ w² and κ of each block, shape (blocks). */
  readonly blockPrecision: Float64Array;
  readonly kappa: Float64Array;
  readonly lower: Float64Array;
  /** log |A| */
  readonly logDet: number;
}

export interface LayoutInput {
  readonly sigma: Float64Array;
  readonly subject: Int32Array;
  readonly subjectSigma: Float64Array;
  readonly block: Int32Array | null;
  /** 1 for subjects that other groups share, which are not eliminated here; null for none. */
  readonly elsewhere: Uint8Array | null;
}

/** Rows of each block together, in the order of the blocks. Without blocks each row is its own. */
function sortByBlock(block: Int32Array | null, rows: number): [Int32Array, Int32Array] {
  if (block === null) {
    const identity = Int32Array.from({ length: rows + 1 }, (_, i) => i);
    return [identity.slice(0, rows), identity];
  }
  let blocks = 0;
  for (const b of block) blocks = Math.max(blocks, b + 1);
  const start = new Int32Array(blocks + 1);
  for (const b of block) start[b + 1]! += 1;
  for (let b = 0; b < blocks; b += 1) start[b + 1]! += start[b]!;
  const next = start.slice();
  const sorted = new Int32Array(rows);
  for (let i = 0; i < rows; i += 1) {
    const b = block[i]!;
    sorted[next[b]!] = i;
    next[b]! += 1;
  }
  return [sorted, start];
}

/** Sorts rows by block and finds which subjects need a place of their own.
 * @param input - errors ≥ 0 [unit], subject of each row as an index into subjectSigma, block of each row from 0
 * @returns the layout
 * @accuracy exact
 * @source from memory: a random effect with a single observation is one more variance of that observation */
export function layoutNoise(input: LayoutInput): NoiseLayout {
  const { sigma, subject, subjectSigma, block, elsewhere } = input;
  const rows = sigma.length;
  const knownVariance = sigma.map((s) => s * s);
  const count = new Int32Array(subjectSigma.length);
  for (const s of subject) count[s]! += 1;
  const slotOf = new Int32Array(subjectSigma.length).fill(-1);
  const slots: number[] = [];
  const slot = new Int32Array(rows).fill(-1);
  for (let i = 0; i < rows; i += 1) {
    const s = subject[i]!;
    const tau = subjectSigma[s]!;
    if (tau === 0 || elsewhere?.[s] === 1) continue;
    if (count[s] === 1) {
      knownVariance[i]! += tau * tau;
      continue;
    }
    if (slotOf[s] === -1) slotOf[s] = slots.push(s) - 1;
    slot[i] = slotOf[s]!;
  }
  const [rowsByBlock, blockStart] = sortByBlock(block, rows);
  const slotTau = Float64Array.from(slots, (s) => subjectSigma[s]!);
  return {
    rows,
    knownVariance,
    rowsByBlock,
    blockStart,
    hasBlocks: block !== null,
    slot,
    slotTau,
  };
}

/** The covariance's factor at given components.
 * @param layout - of the group
 * @param components - σ_o² and σ_b² [unit²], each ≥ 0; σ_b² is not used without blocks
 * @returns the factor
 * @throws {RangeError} when a row has no variance at all
 * @accuracy rounding × (1 + largest number of rows of a subject × τ² / D)
 * @source Woodbury's identity; Golub and Van Loan 2013, Matrix Computations, 4th edition, section 2.1.4 */
export function factorNoise(layout: NoiseLayout, components: Components): Noise {
  const { rows, knownVariance, rowsByBlock, blockStart, hasBlocks, slotTau } = layout;
  const slots = slotTau.length;
  const precision = new Float64Array(rows);
  let logDet = 0;
  for (let i = 0; i < rows; i += 1) {
    const variance = knownVariance[i]! + components.observation;
    if (!(variance > 0)) throw new RangeError(`Row ${i} has no variance: no error and no scatter.`);
    precision[i] = 1 / variance;
    logDet += Math.log(variance);
  }
  const blocks = blockStart.length - 1;
  const blockPrecision = new Float64Array(blocks);
  const kappa = new Float64Array(blocks);
  const lower = new Float64Array(slots * slots);
  for (let b = 0; b < blocks; b += 1) {
    let sum = 0;
    for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) sum += precision[rowsByBlock[at]!]!;
    const gain = hasBlocks ? components.block * sum : 0;
    blockPrecision[b] = sum;
    kappa[b] = hasBlocks ? components.block / (1 + gain) : 0;
    logDet += Math.log1p(gain);
    if (slots > 0)
      addBlock(lower, { layout, precision, from: blockStart[b]!, to: blockStart[b + 1]! }, kappa[b]!);
  }
  for (let s = 0; s < slots; s += 1) {
    for (let t = 0; t <= s; t += 1) lower[s * slots + t]! *= slotTau[s]! * slotTau[t]!;
    lower[s * slots + s]! += 1;
  }
  factorCholesky(lower, slots);
  return {
    layout,
    components,
    precision,
    blockPrecision,
    kappa,
    lower,
    logDet: logDet + logDeterminant(lower, slots),
  };
}

interface BlockRows {
  readonly layout: NoiseLayout;
  readonly precision: Float64Array;
  readonly from: number;
  readonly to: number;
}

/** Adds S′ A₀⁻¹ S of one block to the lower half. */
function addBlock(matrix: Float64Array, { layout, precision, from, to }: BlockRows, kappa: number): void {
  const { rowsByBlock, slot, slotTau } = layout;
  const slots = slotTau.length;
  for (let at = from; at < to; at += 1) {
    const i = rowsByBlock[at]!;
    const s = slot[i]!;
    if (s < 0) continue;
    matrix[s * slots + s]! += precision[i]!;
    if (kappa === 0) continue;
    const pull = kappa * precision[i]!;
    for (let other = from; other < to; other += 1) {
      const j = rowsByBlock[other]!;
      const t = slot[j]!;
      if (t >= 0 && t <= s) matrix[s * slots + t]! -= pull * precision[j]!;
    }
  }
}

/** A₀⁻¹ v, blocks alone. */
function solveBlocks({ layout, precision, kappa }: Noise, v: Float64Array): Float64Array {
  const { rowsByBlock, blockStart } = layout;
  const x = new Float64Array(v.length);
  for (let i = 0; i < v.length; i += 1) x[i] = v[i]! * precision[i]!;
  for (let b = 0; b < kappa.length; b += 1) {
    if (kappa[b] === 0) continue;
    let sum = 0;
    for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) sum += x[rowsByBlock[at]!]!;
    const shared = kappa[b]! * sum;
    for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) {
      const i = rowsByBlock[at]!;
      x[i]! -= shared * precision[i]!;
    }
  }
  return x;
}

/** T½ S′ v. */
function gather({ slot, slotTau }: NoiseLayout, v: Float64Array): Float64Array {
  const sums = new Float64Array(slotTau.length);
  for (let i = 0; i < slot.length; i += 1) {
    const s = slot[i]!;
    if (s >= 0) sums[s]! += v[i]! * slotTau[s]!;
  }
  return sums;
}

/** v − S T½ u. */
function withoutSubjects({ slot, slotTau }: NoiseLayout, v: Float64Array, u: Float64Array): Float64Array {
  const rest = v.slice();
  for (let i = 0; i < rest.length; i += 1) {
    const s = slot[i]!;
    if (s >= 0) rest[i]! -= slotTau[s]! * u[s]!;
  }
  return rest;
}

/** A⁻¹ v.
 * @param noise - the factor of A
 * @param v - shape (n) [any]
 * @returns A⁻¹ v, shape (n) [any per unit²]
 * @accuracy as the factor
 * @source Woodbury's identity; Golub and Van Loan 2013, Matrix Computations, 4th edition, section 2.1.4 */
export function solveNoise(noise: Noise, v: Float64Array): Float64Array {
  const { layout, lower } = noise;
  const slots = layout.slotTau.length;
  const first = solveBlocks(noise, v);
  if (slots === 0) return first;
  const u = gather(layout, first);
  solveLower(lower, slots, u);
  solveLowerTransposed(lower, slots, u);
  return solveBlocks(noise, withoutSubjects(layout, v, u));
}

/** W v, with W = (I + (1/√(1 + g) − 1) q q′) D^−½ and q the direction of w within a block. */
function whitenBlocks(
  { layout, precision, blockPrecision, kappa, components }: Noise,
  v: Float64Array,
): Float64Array {
  const { rowsByBlock, blockStart } = layout;
  const x = new Float64Array(v.length);
  for (let i = 0; i < v.length; i += 1) x[i] = v[i]! * Math.sqrt(precision[i]!);
  for (let b = 0; b < kappa.length; b += 1) {
    if (kappa[b] === 0) continue;
    const sum = blockPrecision[b]!;
    let dot = 0;
    for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) {
      const i = rowsByBlock[at]!;
      dot += Math.sqrt(precision[i]!) * x[i]!;
    }
    const shared = ((1 / Math.sqrt(1 + components.block * sum) - 1) / sum) * dot;
    for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) {
      const i = rowsByBlock[at]!;
      x[i]! += shared * Math.sqrt(precision[i]!);
    }
  }
  return x;
}

/** H v: noise of covariance A becomes uncorrelated noise of unit variance.
 * @param noise - the factor of A
 * @param v - shape (n) [unit]
 * @returns H v, shape (n) [1]
 * @accuracy as the factor
 * @source Andrews 1968, AIAA Journal 6, 1165 */
export function whiten(noise: Noise, v: Float64Array): Float64Array {
  const { layout, lower } = noise;
  const slots = layout.slotTau.length;
  if (slots === 0) return whitenBlocks(noise, v);
  // B′W v = T½ S′ W′W v = T½ S′ A₀⁻¹ v.
  const u = gather(layout, solveBlocks(noise, v));
  solveLower(lower, slots, u);
  solveLowerTransposed(lower, slots, u, 1);
  return whitenBlocks(noise, withoutSubjects(layout, v, u));
}
