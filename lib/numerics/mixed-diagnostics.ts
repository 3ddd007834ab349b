/**
 * What a fitted mixed model says of its rows, effects and degrees of freedom. Symbols as in `mixed-model`; P as in
 * `noise-traces`; v = V⁻¹(y − Xβ).
 */
import { type Noise } from './mixed-noise';
import { sumOverBlocks } from './group-sensitivity';

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
  const { layout, components } = noise;
  if (!layout.hasBlocks) return new Float64Array(0);
  return sumOverBlocks(noise, v).map((sum) => components.block * sum);
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

/** Diagonal of X C X′V⁻¹, from one or more groups of columns.
 * @param design - X, column-major, shape (n, columns) [any]
 * @param gradient - change of the columns' coefficients with each response, column-major, shape (n, columns) [any]
 * @param leverage - shape (n), to which these columns' part is added [1]
 * @accuracy condition × rounding
 * @source Hoaglin and Welsch 1978, American Statistician 32, 17, in its form for correlated errors */
export function addLeverage(design: Float64Array, gradient: Float64Array, leverage: Float64Array): void {
  const rows = leverage.length;
  for (let at = 0; at < design.length; at += 1) leverage[at % rows]! += design[at]! * gradient[at]!;
}

/** Variance of each coefficient's own variance, through the components of one group.
 * @param noise - of the group whose components are uncertain
 * @param gradient - change of the coefficients with each response, column-major, shape (n, columns) [any]
 * @param componentCovariance - of (σ_o², σ_b²), row-major, shape (2, 2) [unit⁴]
 * @returns shape (columns) [any⁴]
 * @accuracy first order in the components
 * @source Satterthwaite 1946, Biometrics Bulletin 2, 110; for mixed models Fai and Cornelius 1996, Journal of Statistical
 * Computation and Simulation 54, 363 */
export function varianceUncertainty(
  noise: Noise,
  gradient: Float64Array,
  componentCovariance: Float64Array,
): Float64Array {
  const rows = noise.layout.rows;
  const columns = rows === 0 ? 0 : gradient.length / rows;
  const square = (v: Float64Array): number => v.reduce((sum, x) => sum + x * x, 0);
  return Float64Array.from({ length: columns }, (_, j) => {
    const column = gradient.subarray(j * rows, (j + 1) * rows);
    // ∂C_jj/∂σ_o² and ∂C_jj/∂σ_b².
    const byObservation = square(column);
    const byBlock = noise.layout.hasBlocks ? square(sumOverBlocks(noise, column)) : 0;
    return (
      byObservation * byObservation * componentCovariance[0]! +
      2 * byObservation * byBlock * componentCovariance[1]! +
      byBlock * byBlock * componentCovariance[3]!
    );
  });
}

/** Degrees of freedom of a coefficient whose variance is itself estimated.
 * @param variance - of the coefficient [any²]
 * @param uncertainty - variance of that variance [any⁴]
 * @returns degrees of freedom, at least 1; Infinity where the variance is certain [1]
 * @accuracy an approximation by matching two moments; exact for one estimated component and no known ones
 * @source Satterthwaite 1946, Biometrics Bulletin 2, 110 */
export function degreesOfFreedom(variance: number, uncertainty: number): number {
  return uncertainty > 0 ? Math.max(1, (2 * variance * variance) / uncertainty) : Infinity;
}
