/**
 * Cholesky factors of small dense matrices, for the random effects of a mixed model: I + B′B, whose eigenvalues are all
 * at least 1, so that nothing is lost by forming it. A design is never squared like this; it goes through
 * `householder-qr`.
 *
 * Matrices are row-major, shape (size, size); of a symmetric matrix and of a factor only the lower half is read.
 */

/** Overwrites the lower half of a symmetric matrix M by its factor L, M = L L′.
 * @param matrix - symmetric, positive definite, row-major, shape (size, size) [1]
 * @param size - of the matrix [1]
 * @throws {RangeError} when the matrix is not positive definite
 * @accuracy backward stable: L L′ differs from M by a few units of rounding
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 4.2 */
export function factorCholesky(matrix: Float64Array, size: number): void {
  for (let i = 0; i < size; i += 1) {
    const rowI = i * size;
    for (let j = 0; j <= i; j += 1) {
      const rowJ = j * size;
      let sum = matrix[rowI + j]!;
      for (let k = 0; k < j; k += 1) sum -= matrix[rowI + k]! * matrix[rowJ + k]!;
      if (j < i) matrix[rowI + j] = sum / matrix[rowJ + j]!;
      else if (sum > 0) matrix[rowI + i] = Math.sqrt(sum);
      else throw new RangeError('The matrix is not positive definite.');
    }
  }
}

/** Solves (L + shift·I) x = b in place.
 * @param lower - L, row-major, shape (size, size) [1]
 * @param size - of the matrix [1]
 * @param x - b on entry, x on return, shape (size) [1]
 * @param shift - added to the diagonal [1]
 * @accuracy backward stable
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 3.1 */
export function solveLower(lower: Float64Array, size: number, x: Float64Array, shift = 0): void {
  for (let i = 0; i < size; i += 1) {
    const row = i * size;
    let sum = x[i]!;
    for (let k = 0; k < i; k += 1) sum -= lower[row + k]! * x[k]!;
    x[i] = sum / (lower[row + i]! + shift);
  }
}

/** Solves (L + shift·I)′ x = b in place.
 * @param lower - L, row-major, shape (size, size) [1]
 * @param size - of the matrix [1]
 * @param x - b on entry, x on return, shape (size) [1]
 * @param shift - added to the diagonal [1]
 * @accuracy backward stable
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 3.1 */
export function solveLowerTransposed(lower: Float64Array, size: number, x: Float64Array, shift = 0): void {
  for (let i = size - 1; i >= 0; i -= 1) {
    const row = i * size;
    const value = x[i]! / (lower[row + i]! + shift);
    x[i] = value;
    for (let k = 0; k < i; k += 1) x[k]! -= lower[row + k]! * value;
  }
}

/** M⁻¹ from its factor.
 * @param lower - L, row-major, shape (size, size) [1]
 * @param size - of the matrix [1]
 * @returns M⁻¹, both halves, row-major, shape (size, size) [1]
 * @accuracy relative error about condition(M) × rounding
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 4.2 */
export function invertCholesky(lower: Float64Array, size: number): Float64Array {
  const inverse = new Float64Array(size * size);
  const column = new Float64Array(size);
  for (let j = 0; j < size; j += 1) {
    column.fill(0);
    column[j] = 1;
    solveLower(lower, size, column);
    solveLowerTransposed(lower, size, column);
    inverse.set(column, j * size);
  }
  return inverse;
}

/** log |M| from its factor.
 * @param lower - L, row-major, shape (size, size) [1]
 * @param size - of the matrix [1]
 * @returns natural logarithm of the determinant [1]
 * @accuracy rounding
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 4.2 */
export function logDeterminant(lower: Float64Array, size: number): number {
  let sum = 0;
  for (let i = 0; i < size; i += 1) sum += Math.log(lower[i * size + i]!);
  return 2 * sum;
}
