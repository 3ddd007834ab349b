/**
 * Least squares with correlated errors: the design and the response are whitened by the root of the noise's covariance,
 * priors on coefficients enter as one more row each, and the whole goes through a column-scaled QR.
 */
import { type Noise, whiten } from './mixed-noise';
import { applyQTransposed, factorQr, type QrFactor, solveR } from './householder-qr';

/** What is known of a coefficient beforehand: one more row, value ± sigma. */
export interface Prior {
  /** Number of the column in the design. */
  readonly column: number;
  readonly value: number;
  /** > 0 */
  readonly sigma: number;
}

export interface LinearPart {
  /** Column-major, shape (n, columns). */
  readonly design: Float64Array;
  readonly columns: number;
  /** Shape (n). */
  readonly response: Float64Array;
  readonly priors: readonly Prior[];
}

export interface WhitenedFit {
  /** Of the whitened design with the priors' rows below it. */
  readonly qr: QrFactor;
  readonly coefficients: Float64Array;
  /** r′ V⁻¹ r, priors included. */
  readonly chi2: number;
  /** log |X′V⁻¹X|, priors included. */
  readonly logDetInformation: number;
}

/** Whitened rows, then the priors' rows.
 * @param noise - of the rows
 * @param part - design, response and priors
 * @returns the design, column-major, and the response, both of n + priors rows [1]
 * @accuracy as the noise's factor
 * @source Aitken 1935, Proceedings of the Royal Society of Edinburgh 55, 42 */
export function whitenPart(
  noise: Noise,
  part: LinearPart,
): { readonly design: Float64Array; readonly response: Float64Array } {
  const rows = noise.layout.rows;
  const all = rows + part.priors.length;
  const design = new Float64Array(all * part.columns);
  for (let j = 0; j < part.columns; j += 1) {
    design.set(whiten(noise, part.design.subarray(j * rows, (j + 1) * rows)), j * all);
  }
  const response = new Float64Array(all);
  response.set(whiten(noise, part.response));
  for (const [k, prior] of part.priors.entries()) {
    design[prior.column * all + rows + k] = 1 / prior.sigma;
    response[rows + k] = prior.value / prior.sigma;
  }
  return { design, response };
}

/** log |X′X| of what was factored, over the columns within its rank.
 * @param qr - of a design
 * @returns natural logarithm of the determinant [1]
 * @accuracy rounding × condition
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 5.2 */
export function logDetInformation(qr: QrFactor): number {
  const { rows, rank, factors, order, scale } = qr;
  let sum = 0;
  for (let k = 0; k < rank; k += 1) sum += Math.log(Math.abs(factors[k * rows + k]!) / scale[order[k]!]!);
  return 2 * sum;
}

/** Generalised least squares.
 * @param noise - the factor of the rows' covariance
 * @param part - design, response and priors
 * @returns coefficients, χ² and the factor; its rank says whether all are determined
 * @accuracy coefficients: condition × rounding
 * @source Aitken 1935, Proceedings of the Royal Society of Edinburgh 55, 42; priors as rows: Theil and Goldberger 1961,
 * International Economic Review 2, 65 */
export function fitWhitened(noise: Noise, part: LinearPart): WhitenedFit {
  const { design, response } = whitenPart(noise, part);
  const qr = factorQr(design, response.length, part.columns);
  applyQTransposed(qr, response);
  let chi2 = 0;
  for (let i = qr.rank; i < response.length; i += 1) chi2 += response[i]! * response[i]!;
  return { qr, coefficients: solveR(qr, response), chi2, logDetInformation: logDetInformation(qr) };
}
