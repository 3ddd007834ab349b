/**
 * What a fitted mixed model says of its rows, effects and degrees of freedom. Symbols as in `mixed-model`; P as in
 * `noise-traces`; v = V⁻¹(y − Xβ).
 */
import { type Noise } from './mixed-noise';
import { type Projection } from './noise-traces';

/** What is known of a group's observations after a fit. All arrays have shape (n). */
export interface RowDiagnostics {
  /** y − Xβ [unit]. */
  readonly marginalResiduals: Float64Array;
  /** y − Xβ − Sa − Fb [unit]. */
  readonly conditionalResiduals: Float64Array;
  /** H (y − Xβ), uncorrelated and of unit variance but for the coefficients fitted [1]. Rows keep their places, but each
   * carries a little of its block's and its subject's others. */
  readonly whitenedResiduals: Float64Array;
  /** What a row differs by from its prediction by all the other rows, its block's and subject's included, in units of
   * that difference's standard deviation [1]; 0 where the others predict nothing. */
  readonly deletionResiduals: Float64Array;
  /** How much the fitted Xβ of a row moves with its own response [1]; with the priors' leverage the sum is p. */
  readonly leverage: Float64Array;
}

/** Share of V⁻¹'s diagonal below which P's is rounding: the row alone determines a coefficient. [1] */
const predictionTolerance = 1e-10;

/** e = (σ_i² + σ_o²) v.
 * @param sigma - σ_i, shape (n) [unit]
 * @param noise - with σ_o²
 * @param v - V⁻¹(y − Xβ), shape (n) [1 per unit]
 * @returns y − Xβ − Sa − Fb, shape (n) [unit]
 * @accuracy rounding
 * @source Henderson 1975, Biometrics 31, 423 */
export function conditionalResiduals(sigma: Float64Array, noise: Noise, v: Float64Array): Float64Array {
  return v.map((value, i) => (sigma[i]! ** 2 + noise.components.observation) * value);
}

/** b = σ_b² F′v.
 * @param noise - with σ_b² and the blocks
 * @param v - V⁻¹(y − Xβ), shape (n) [1 per unit]
 * @returns best linear predictions, shape (blocks); empty without blocks [unit]
 * @accuracy rounding
 * @source Henderson 1975, Biometrics 31, 423 */
export function predictBlocks(noise: Noise, v: Float64Array): Float64Array {
  const { layout, components, kappa } = noise;
  if (!layout.hasBlocks) return new Float64Array(0);
  return kappa.map((_, b) => {
    let sum = 0;
    for (let at = layout.blockStart[b]!; at < layout.blockStart[b + 1]!; at += 1)
      sum += v[layout.rowsByBlock[at]!]!;
    return components.block * sum;
  });
}

/** Adds S′v of one group's rows to the sums of the subjects.
 * @param sums - shape (subjects), changed [1 per unit]
 * @param subject - of each row, shape (n)
 * @param v - V⁻¹(y − Xβ), shape (n) [1 per unit]
 * @accuracy rounding
 * @source Henderson 1975, Biometrics 31, 423: a = T S′v */
export function addSubjectSums(sums: Float64Array, subject: Int32Array, v: Float64Array): void {
  for (let i = 0; i < v.length; i += 1) sums[subject[i]!]! += v[i]!;
}

/** (P y)_i / √P_ii.
 * @param inverseDiagonal - of V⁻¹, shape (n) [1 per unit²]
 * @param diagonal - of P, shape (n) [1 per unit²]
 * @param v - P y, shape (n) [1 per unit]
 * @returns deletion residuals, shape (n) [1]
 * @accuracy rounding × V⁻¹_ii / P_ii
 * @source Cook and Weisberg 1982, Residuals and Influence in Regression, section 2.2, in its form for correlated errors */
export function deletionResiduals(
  inverseDiagonal: Float64Array,
  diagonal: Float64Array,
  v: Float64Array,
): Float64Array {
  return v.map((value, i) =>
    diagonal[i]! > predictionTolerance * inverseDiagonal[i]! ? value / Math.sqrt(diagonal[i]!) : 0,
  );
}

/** Diagonal of X C X′V⁻¹.
 * @param design - X, column-major, shape (n, p) [any]
 * @param inverse - U with C = U U′, column-major, shape (p, p) [any]
 * @param projection - with V⁻¹X U
 * @returns leverage, shape (n), whose sum is p less the priors' leverage [1]
 * @accuracy condition × rounding
 * @source Hoaglin and Welsch 1978, American Statistician 32, 17, in its form for correlated errors */
export function rowLeverage(
  design: Float64Array,
  inverse: Float64Array,
  projection: Projection,
): Float64Array {
  const { explained, rank, noise } = projection;
  const rows = noise.layout.rows;
  const leverage = new Float64Array(rows);
  const columns = rows === 0 ? 0 : design.length / rows;
  for (let k = 0; k < rank; k += 1) {
    for (let i = 0; i < rows; i += 1) {
      let x = 0;
      for (let j = 0; j < columns; j += 1) x += design[j * rows + i]! * inverse[k * columns + j]!;
      leverage[i]! += x * explained[k * rows + i]!;
    }
  }
  return leverage;
}

/** Degrees of freedom of each coefficient's variance, C_jj being a function of estimated components.
 * @param projection - with V⁻¹X U
 * @param inverse - U with C = U U′, column-major, shape (p, p) [any]
 * @param componentCovariance - of (σ_o², σ_b²), row-major, shape (2, 2) [unit⁴]
 * @returns degrees of freedom, at least 1, shape (p); Infinity where no component is uncertain [1]
 * @accuracy an approximation by matching two moments; exact for one estimated component and no known ones
 * @source Satterthwaite 1946, Biometrics Bulletin 2, 110; for mixed models Fai and Cornelius 1996, Journal of Statistical
 * Computation and Simulation 54, 363 */
export function satterthwaite(
  projection: Projection,
  inverse: Float64Array,
  componentCovariance: Float64Array,
): Float64Array {
  const { explained, rank, noise } = projection;
  const rows = noise.layout.rows;
  const { rowsByBlock, blockStart } = noise.layout;
  const columns = rank === 0 ? 0 : inverse.length / rank;
  const degrees = new Float64Array(columns);
  const combination = new Float64Array(rows);
  for (let j = 0; j < columns; j += 1) {
    combination.fill(0);
    let variance = 0;
    for (let k = 0; k < rank; k += 1) {
      const u = inverse[k * columns + j]!;
      variance += u * u;
      for (let i = 0; i < rows; i += 1) combination[i]! += u * explained[k * rows + i]!;
    }
    let byObservation = 0;
    for (const value of combination) byObservation += value * value;
    let byBlock = 0;
    for (let b = 0; b + 1 < blockStart.length; b += 1) {
      let sum = 0;
      for (let at = blockStart[b]!; at < blockStart[b + 1]!; at += 1) sum += combination[rowsByBlock[at]!]!;
      byBlock += sum * sum;
    }
    const uncertainty =
      byObservation * byObservation * componentCovariance[0]! +
      2 * byObservation * byBlock * componentCovariance[1]! +
      byBlock * byBlock * componentCovariance[3]!;
    degrees[j] = uncertainty > 0 ? Math.max(1, (2 * variance * variance) / uncertainty) : Infinity;
  }
  return degrees;
}
