/**
 * Householder QR with column pivoting of a tall matrix, A S P = Q R: the one way in which designs are solved here.
 *
 * | symbol | name | shape | meaning |
 * |---|---|---|---|
 * | A | matrix | (m, p), column-major | a design, rows already divided by their errors |
 * | S | scale | (p) | powers of two that bring each column's length to 0.7 … 1.4: scaling then rounds nothing |
 * | P | order | (p) | order[k] is the column of A that stands at place k |
 * | R | factors | upper triangle | columns of zero or dependent length end it early: rank < p |
 *
 * Sources: Golub and Van Loan 2013, Matrix Computations, 4th edition, sections 5.2 and 5.4 (pivoting: Businger and Golub
 * 1965, Numerische Mathematik 7, 269); van der Sluis 1969, Numerische Mathematik 14, 14 (columns of equal length).
 */
import { Matrix, SingularValueDecomposition } from 'ml-matrix';

export interface QrFactor {
  readonly rows: number;
  readonly columns: number;
  /** Columns that stand on their own; equal to `columns` for a design that determines everything. */
  readonly rank: number;
  /** R in the upper triangle, Householder vectors below it; column-major, shape (rows, columns). */
  readonly factors: Float64Array;
  /** First components of the Householder vectors, shape (rank). */
  readonly heads: Float64Array;
  readonly order: Int32Array;
  readonly scale: Float64Array;
}

/** Remaining length of a scaled column below which it counts as dependent on those before it. Rounding leaves about
 * 1e-16; columns that differ in their tenth decimal leave 1e-10. Common practice, no source. [1] */
export const rankTolerance = 1e-13;

/** Share of a column in a dependence below which it is rounding. [1] */
const participationTolerance = 1e-8;

const length = (a: Float64Array, from: number, to: number): number => {
  let sum = 0;
  for (let i = from; i < to; i += 1) sum += a[i]! * a[i]!;
  return Math.sqrt(sum);
};

function swapColumns(a: Float64Array, rows: number, one: number, other: number): void {
  for (let i = 0; i < rows; i += 1) {
    const kept = a[one * rows + i]!;
    a[one * rows + i] = a[other * rows + i]!;
    a[other * rows + i] = kept;
  }
}

/** Factors a matrix; it is copied, not changed.
 * @param matrix - column-major, shape (rows, columns), finite [any]
 * @param rows - of the matrix, 0 or more, also fewer than columns [1]
 * @param columns - of the matrix [1]
 * @returns the factor; its rank says whether the columns are independent
 * @throws {RangeError} when the length is not rows × columns or a number is not finite
 * @accuracy backward stable: Q R differs from the scaled matrix by about 10 units of rounding
 * @source Businger and Golub 1965, Numerische Mathematik 7, 269 */
export function factorQr(matrix: Float64Array, rows: number, columns: number): QrFactor {
  if (matrix.length !== rows * columns) {
    throw new RangeError(`A matrix of ${rows} × ${columns} does not have ${matrix.length} numbers.`);
  }
  const factors = Float64Array.from(matrix);
  const scale = new Float64Array(columns);
  for (let j = 0; j < columns; j += 1) {
    const norm = length(factors, j * rows, (j + 1) * rows);
    if (!Number.isFinite(norm)) throw new RangeError(`Column ${j} of the matrix is not finite.`);
    const factor = norm > 0 ? 2 ** -Math.round(Math.log2(norm)) : 1;
    scale[j] = factor;
    for (let i = j * rows; i < (j + 1) * rows; i += 1) factors[i]! *= factor;
  }
  const order = Int32Array.from({ length: columns }, (_, j) => j);
  const heads = new Float64Array(Math.min(rows, columns));
  let rank = 0;
  for (; rank < heads.length; rank += 1) {
    const k = rank;
    let longest = k;
    let best = -1;
    for (let j = k; j < columns; j += 1) {
      const left = length(factors, j * rows + k, (j + 1) * rows);
      // Only a clearly longer column comes first: equal ones keep their order on every machine.
      if (left > best * (1 + 1e-9)) {
        best = left;
        longest = j;
      }
    }
    if (best <= rankTolerance) break;
    if (longest !== k) {
      swapColumns(factors, rows, k, longest);
      [order[k], order[longest]] = [order[longest]!, order[k]!];
    }
    reflect(factors, { rows, columns, step: k, norm: best }, heads);
  }
  return { rows, columns, rank, factors, heads: heads.slice(0, rank), order, scale };
}

interface Step {
  readonly rows: number;
  readonly columns: number;
  readonly step: number;
  readonly norm: number;
}

/** One reflection: it turns column `step` from its diagonal down into one number and is applied to the later ones. */
function reflect(a: Float64Array, { rows, columns, step, norm }: Step, heads: Float64Array): void {
  const start = step * rows + step;
  const end = (step + 1) * rows;
  const diagonal = a[start]! > 0 ? -norm : norm;
  const head = a[start]! - diagonal;
  heads[step] = head;
  a[start] = diagonal;
  // v = (head, a below the diagonal); v′v / 2 = −diagonal · head.
  const half = -diagonal * head;
  for (let j = step + 1; j < columns; j += 1) {
    const shift = (j - step) * rows;
    let dot = head * a[start + shift]!;
    for (let i = start + 1; i < end; i += 1) dot += a[i]! * a[i + shift]!;
    const factor = dot / half;
    a[start + shift]! -= factor * head;
    for (let i = start + 1; i < end; i += 1) a[i + shift]! -= factor * a[i]!;
  }
}

function applyReflection(factor: QrFactor, step: number, vector: Float64Array): void {
  const { rows, factors, heads } = factor;
  const head = heads[step]!;
  const column = step * rows;
  const half = -factors[column + step]! * head;
  let dot = head * vector[step]!;
  for (let i = step + 1; i < rows; i += 1) dot += factors[column + i]! * vector[i]!;
  const times = dot / half;
  vector[step]! -= times * head;
  for (let i = step + 1; i < rows; i += 1) vector[i]! -= times * factors[column + i]!;
}

/** Q′v in place: the first `rank` numbers are what the columns explain, the others what they leave.
 * @param factor - of the design
 * @param vector - v on entry, shape (rows) [any]
 * @accuracy backward stable
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 5.2 */
export function applyQTransposed(factor: QrFactor, vector: Float64Array): void {
  for (let step = 0; step < factor.rank; step += 1) applyReflection(factor, step, vector);
}

/** Q v in place.
 * @param factor - of the design
 * @param vector - v on entry, shape (rows) [any]
 * @accuracy backward stable
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 5.2 */
export function applyQ(factor: QrFactor, vector: Float64Array): void {
  for (let step = factor.rank - 1; step >= 0; step -= 1) applyReflection(factor, step, vector);
}

/** Coefficients x with R P⁻¹ S⁻¹ x = z, in the order and units of the design's columns; columns beyond the rank get 0.
 * @param factor - of the design
 * @param z - the first `rank` numbers of Q′y are read [any]
 * @returns x, shape (columns) [any]
 * @accuracy relative error about condition × rounding
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 5.3 */
export function solveR(factor: QrFactor, z: Float64Array): Float64Array {
  const { rows, columns, rank, factors, order, scale } = factor;
  const x = new Float64Array(columns);
  const w = Float64Array.from(z.subarray(0, rank));
  for (let k = rank - 1; k >= 0; k -= 1) {
    const value = w[k]! / factors[k * rows + k]!;
    x[order[k]!] = value * scale[order[k]!]!;
    for (let i = 0; i < k; i += 1) w[i]! -= factors[k * rows + i]! * value;
  }
  return x;
}

/** The vector h with (R P⁻¹ S⁻¹)′ h = g, needed by iterative refinement.
 * @param factor - of the design, of full rank
 * @param g - in the order of the design's columns, shape (columns) [any]
 * @returns h, shape (rank) [any]
 * @accuracy relative error about condition × rounding
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 3.1 */
export function solveRTransposed(factor: QrFactor, g: Float64Array): Float64Array {
  const { rows, rank, factors, order, scale } = factor;
  const h = new Float64Array(rank);
  for (let k = 0; k < rank; k += 1) {
    let sum = g[order[k]!]! * scale[order[k]!]!;
    for (let i = 0; i < k; i += 1) sum -= factors[k * rows + i]! * h[i]!;
    h[k] = sum / factors[k * rows + k]!;
  }
  return h;
}

/** The inverse U of R P⁻¹ S⁻¹, so that (A′A)⁻¹ = U U′: the covariance, without ever forming A′A.
 * @param factor - of the design; columns beyond the rank become zero rows
 * @returns U, column-major, shape (columns, rank) [any]
 * @accuracy relative error about condition × rounding
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 5.3 */
export function inverseR(factor: QrFactor): Float64Array {
  const { columns, rank } = factor;
  const inverse = new Float64Array(columns * rank);
  const unit = new Float64Array(rank);
  for (let k = 0; k < rank; k += 1) {
    unit.fill(0);
    unit[k] = 1;
    inverse.set(solveR(factor, unit), k * columns);
  }
  return inverse;
}

/** Combinations of the design's columns that are zero in every row.
 * @param factor - of the design
 * @returns one vector a column beyond the rank, with −1 for that column, shape (columns) [any]; none at full rank
 * @accuracy condition × rounding
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 5.5.7 */
export function nullCombinations(factor: QrFactor): readonly Float64Array[] {
  const { rows, columns, rank, factors, order, scale } = factor;
  const combinations: Float64Array[] = [];
  for (let j = rank; j < columns; j += 1) {
    const combination = solveR(factor, factors.subarray(j * rows, j * rows + rank));
    const own = scale[order[j]!]!;
    combination.forEach((value, k) => (combination[k] = value / own));
    combination[order[j]!] = -1;
    combinations.push(combination);
  }
  return combinations;
}

/** The columns that take part in a combination.
 * @param combination - shape (columns) [any]
 * @param lengths - a length of each column, shape (columns) [any]
 * @returns column numbers, ascending
 * @accuracy a column takes part when its share, all columns at equal length, is above 1e-8 of the largest
 * @source common practice, no source */
export function participants(combination: Float64Array, lengths: Float64Array): readonly number[] {
  const shares = combination.map((value, j) => Math.abs(value * lengths[j]!));
  const largest = Math.max(...shares);
  // A column of length zero stands alone.
  return [...shares.keys()].filter((j) =>
    largest > 0 ? shares[j]! > participationTolerance * largest : combination[j] !== 0,
  );
}

/** The sets of columns that the data cannot tell apart: in each set some combination of its columns is zero in every row.
 * @param factor - of the design
 * @returns sets of column numbers, each ascending; none when the rank is full
 * @accuracy as `participants`
 * @source Golub and Van Loan 2013, Matrix Computations, 4th edition, section 5.5.7 */
export function inseparableColumns(factor: QrFactor): readonly (readonly number[])[] {
  const lengths = factor.scale.map((scale) => 1 / scale);
  return nullCombinations(factor).map((combination) => participants(combination, lengths));
}

/** Largest over smallest singular value of the design with all columns at length 1.
 * @param factor - of the design
 * @returns condition number, 1 or more; Infinity below full rank [1]
 * @accuracy 1e-10 relative up to 1e6, its order of magnitude beyond
 * @source van der Sluis 1969, Numerische Mathematik 14, 14 */
export function conditionNumber(factor: QrFactor): number {
  const { rows, columns, rank, factors } = factor;
  if (rank < columns) return Infinity;
  if (columns === 0) return 1;
  const unit = new Matrix(columns, columns);
  for (let k = 0; k < columns; k += 1) {
    const norm = length(factors, k * rows, k * rows + k + 1);
    for (let i = 0; i <= k; i += 1) unit.set(i, k, factors[k * rows + i]! / norm);
  }
  const values = new SingularValueDecomposition(unit).diagonal;
  return values[0]! / values[columns - 1]!;
}
