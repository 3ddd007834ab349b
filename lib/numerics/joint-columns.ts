/**
 * Which columns of a joint model the data cannot tell apart, own and shared together, without a dense matrix of all
 * groups: own columns are eliminated group by group, and what is left of the shared ones is looked at together.
 */
import { type Prior } from './generalised-least-squares';
import {
  applyQTransposed,
  factorQr,
  nullCombinations,
  participants,
  type QrFactor,
  solveR,
} from './householder-qr';

/** A column of a joint model: of one group, or shared when the group is null. */
export interface JointColumn {
  readonly group: number | null;
  readonly column: number;
}

export interface ColumnsOfGroup {
  /** Own design and its columns, shared design, own priors; shapes (n, p), (n, q). */
  readonly design: Float64Array;
  readonly columns: number;
  readonly sharedDesign: Float64Array;
  readonly priors: readonly Prior[];
  readonly rows: number;
}

/** Length, relative to the column's own, below which what is left of a shared column is rounding. [1] */
const leftoverTolerance = 1e-13;

/** A design with a row for each prior below it; for the rank alone, whatever the errors.
 * @param design - column-major, shape (n, columns) [any]
 * @param rows - n [1]
 * @param columns - of the design [1]
 * @param priors - on its columns
 * @returns the factor of the design with a 1 for each prior
 * @accuracy as `factorQr`
 * @source from memory: the rank of a design does not depend on the rows' errors */
export function factorColumns(
  design: Float64Array,
  rows: number,
  columns: number,
  priors: readonly Prior[],
): QrFactor {
  const all = rows + priors.length;
  const stacked = new Float64Array(all * columns);
  for (let j = 0; j < columns; j += 1) stacked.set(design.subarray(j * rows, (j + 1) * rows), j * all);
  for (const [k, { column }] of priors.entries()) stacked[column * all + rows + k] = 1;
  return factorQr(stacked, all, columns);
}

const lengthOf = (column: Float64Array): number => Math.sqrt(column.reduce((sum, x) => sum + x * x, 0));

/** The sets of columns that cannot be told apart.
 * @param groups - own and shared designs
 * @param sharedColumns - q [1]
 * @param sharedPriors - on shared columns
 * @returns sets of columns; none when everything is determined
 * @accuracy as `participants`
 * @source Björck 1996, Numerical Methods for Least Squares Problems, section 6.3 */
export function inseparableJointColumns(
  groups: readonly ColumnsOfGroup[],
  sharedColumns: number,
  sharedPriors: readonly Prior[],
): readonly (readonly JointColumn[])[] {
  const factors = groups.map(({ design, rows, columns, priors }) =>
    factorColumns(design, rows, columns, priors),
  );
  const own = factors.flatMap((qr, group) => {
    const lengths = qr.scale.map((scale) => 1 / scale);
    return nullCombinations(qr).map((combination) =>
      participants(combination, lengths).map((column) => ({ group, column })),
    );
  });
  if (own.length > 0 || sharedColumns === 0) return own;
  const total = factors.reduce((sum, qr) => sum + qr.rows - qr.rank, 0);
  const left = new Float64Array(total * sharedColumns);
  const explained: Float64Array[][] = [];
  const lengths = new Float64Array(sharedColumns);
  for (let j = 0; j < sharedColumns; j += 1) {
    let at = j * total;
    let square = sharedPriors.some((prior) => prior.column === j) ? 1 : 0;
    explained.push(
      groups.map(({ sharedDesign, rows }, k) => {
        const qr = factors[k]!;
        const column = new Float64Array(qr.rows);
        column.set(sharedDesign.subarray(j * rows, (j + 1) * rows));
        square += lengthOf(column) ** 2;
        applyQTransposed(qr, column);
        left.set(column.subarray(qr.rank), at);
        at += qr.rows - qr.rank;
        return solveR(qr, column);
      }),
    );
    lengths[j] = Math.sqrt(square);
    const rest = left.subarray(j * total, (j + 1) * total);
    if (lengthOf(rest) <= leftoverTolerance * lengths[j]!) rest.fill(0);
  }
  const border = factorColumns(left, total, sharedColumns, sharedPriors);
  return nullCombinations(border).map((combination) => {
    const all = [...participants(combination, lengths)].map((column) => ({ group: null, column }));
    const byGroup = groups.flatMap(({ columns }, group) => {
      const part = new Float64Array(columns);
      for (let j = 0; j < sharedColumns; j += 1) {
        for (let c = 0; c < columns; c += 1) part[c]! += combination[j]! * explained[j]![group]![c]!;
      }
      return significant(part, factors[group]!, { combination, lengths }).map((column) => ({
        group,
        column,
      }));
    });
    return [...all, ...byGroup];
  });
}

interface SharedCombination {
  readonly combination: Float64Array;
  readonly lengths: Float64Array;
}

/** Own columns whose share is not rounding beside the shared ones'. */
function significant(
  part: Float64Array,
  qr: QrFactor,
  { combination, lengths }: SharedCombination,
): number[] {
  const largest = Math.max(...combination.map((value, j) => Math.abs(value * lengths[j]!)));
  return [...part.keys()].filter((c) => Math.abs(part[c]!) / qr.scale[c]! > 1e-8 * largest);
}
