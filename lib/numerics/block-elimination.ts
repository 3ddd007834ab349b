/**
 * Generalised least squares over many groups of observations at given components. Group k has
 *
 *     y_k = X_k β_k + Q_k γ + S_k T½ u + noise of covariance A_k
 *
 * | symbol | code name | shape | meaning |
 * |---|---|---|---|
 * | X, β | own | (n, p), (p) | columns and coefficients of this group alone |
 * | Q, γ | shared | (n, q), (q) | coefficients that all groups share |
 * | S T½, u | border, borderTau | (border) | subjects seen in several groups, in units of their errors: u ~ N(0, I) |
 * | A | noise | | scatter, blocks, and subjects of this group alone |
 *
 * Each group is whitened and its β_k eliminated by QR; what is left of u and γ meets in a border that does not grow with
 * the groups. u is eliminated by the Cholesky factor L of M = I + Σ (remaining S)′(remaining S), γ by QR of the rows that
 * then remain, M⁻¹ times their part in u being G. Cost is linear in the number of groups.
 *
 * Sources: Björck 1996, Numerical Methods for Least Squares Problems, section 6.3 (block angular problems); Henderson
 * 1975, Biometrics 31, 423 (u as unknowns with a prior).
 */
import { factorCholesky, invertCholesky, logDeterminant, solveLower, solveLowerTransposed } from './cholesky';
import { type LinearPart, logDetInformation, type Prior, whitenPart } from './generalised-least-squares';
import { applyQTransposed, factorQr, type QrFactor, solveR } from './householder-qr';
import { type Noise, whiten } from './mixed-noise';

export interface EliminationGroup {
  readonly noise: Noise;
  /** Response, own design and priors on own columns. */
  readonly own: LinearPart;
  /** Q, column-major, shape (n, q). */
  readonly shared: Float64Array;
  /** Place of a row's subject in the border, −1 for none: shape (n). */
  readonly border: Int32Array;
}

export interface EliminationInput {
  readonly groups: readonly EliminationGroup[];
  /** q */
  readonly sharedColumns: number;
  readonly sharedPriors: readonly Prior[];
  /** τ of the border's subjects, shape (border) [unit]. */
  readonly borderTau: Float64Array;
}

interface ReducedGroup {
  /** Of the whitened own design, priors below. */
  readonly qr: QrFactor;
  /** The border subjects that this group saw, ascending. */
  readonly seen: readonly number[];
  /** First p numbers of Q′H S T½ for each of them, shape (seen)(p). */
  readonly heads: readonly Float64Array[];
}

export interface Elimination {
  readonly input: EliminationInput;
  readonly groups: readonly ReducedGroup[];
  /** M⁻¹, row-major, shape (border, border). */
  readonly borderInverse: Float64Array;
  /** G, column-major, shape (border, q). */
  readonly borderShares: Float64Array;
  /** Of the border's rows, for γ. */
  readonly qr: QrFactor;
  readonly shared: Float64Array;
  /** β_k of each group. */
  readonly coefficients: readonly Float64Array[];
  /** a = T½ u, shape (border) [unit]. */
  readonly borderEffects: Float64Array;
  readonly chi2: number;
  /** log |V| + log |X′V⁻¹X| over all groups, own and shared columns. */
  readonly logDet: number;
}

/** Q′H v of a group, the priors' rows being zero: β_k's part first, then what is left for the border.
 * @param group - of the rows
 * @param qr - of its whitened own design
 * @param v - shape (n) [unit]
 * @returns shape (n + priors) [1]
 * @accuracy as the noise's factor
 * @source Björck 1996, Numerical Methods for Least Squares Problems, section 6.3 */
export function reduceForGroup(group: EliminationGroup, qr: QrFactor, v: Float64Array): Float64Array {
  const reduced = new Float64Array(qr.rows);
  reduced.set(whiten(group.noise, v));
  applyQTransposed(qr, reduced);
  return reduced;
}

/** The column of one of the border's subjects in S T½.
 * @param group - of the rows
 * @param s - place of the subject in the border [1]
 * @param tau - its error [unit]
 * @returns shape (n) [unit]
 * @accuracy exact
 * @source definition */
export function borderColumn(group: EliminationGroup, s: number, tau: number): Float64Array {
  const { border } = group;
  const column = new Float64Array(border.length);
  for (let i = 0; i < column.length; i += 1) if (border[i] === s) column[i] = tau;
  return column;
}

interface BorderTerm {
  readonly v: Float64Array;
  readonly u: Float64Array;
}

/** v − S T½ u.
 * @param group - of the rows
 * @param borderTau - shape (border) [unit]
 * @param of - v of shape (n) and u of shape (border)
 * @returns shape (n) [unit]
 * @accuracy rounding
 * @source definition */
export function groupWithoutBorder(
  group: EliminationGroup,
  borderTau: Float64Array,
  of: BorderTerm,
): Float64Array {
  const { border } = group;
  const { v, u } = of;
  const rest = v.slice();
  for (let i = 0; i < rest.length; i += 1) {
    const s = border[i]!;
    if (s >= 0) rest[i]! -= borderTau[s]! * u[s]!;
  }
  return rest;
}

const dotFrom = (a: Float64Array, b: Float64Array, from: number): number => {
  let sum = 0;
  for (let i = from; i < a.length; i += 1) sum += a[i]! * b[i]!;
  return sum;
};

interface Border {
  /** Lower half of M − I, then of M, then L. */
  readonly matrix: Float64Array;
  /** Right sides of γ's columns and of the response, each of shape (border). */
  readonly sides: readonly Float64Array[];
}

/** Eliminates β_k and adds what is left to the border. */
function reduceGroup(
  group: EliminationGroup,
  { borderTau, sharedColumns }: EliminationInput,
  border: Border,
): ReducedGroup {
  const rows = group.noise.layout.rows;
  const size = borderTau.length;
  const whitened = whitenPart(group.noise, group.own);
  const qr = factorQr(whitened.design, whitened.response.length, group.own.columns);
  applyQTransposed(qr, whitened.response);
  const seen = [...new Set(group.border.filter((s) => s >= 0))].sort((a, b) => a - b);
  const reduced = seen.map((s) => reduceForGroup(group, qr, borderColumn(group, s, borderTau[s]!)));
  const sides = Array.from({ length: sharedColumns }, (_, j) =>
    reduceForGroup(group, qr, group.shared.subarray(j * rows, (j + 1) * rows)),
  );
  sides.push(whitened.response);
  for (const [a, s] of seen.entries()) {
    for (let b = 0; b <= a; b += 1) {
      border.matrix[s * size + seen[b]!]! += dotFrom(reduced[a]!, reduced[b]!, qr.rank);
    }
    for (const [j, side] of sides.entries()) border.sides[j]![s]! += dotFrom(reduced[a]!, side, qr.rank);
  }
  return { qr, seen, heads: reduced.map((column) => column.slice(0, qr.rank)) };
}

/** Rows that remain for γ: those of all groups, those of u, those of the priors. */
function stackBorder(
  input: EliminationInput,
  groups: readonly ReducedGroup[],
  solved: readonly Float64Array[],
) {
  const { sharedColumns, sharedPriors, borderTau } = input;
  const size = borderTau.length;
  const rowsOf = groups.map(({ qr }) => qr.rows - qr.rank);
  const total = rowsOf.reduce((sum, n) => sum + n, 0) + size + sharedPriors.length;
  const stacked = new Float64Array(total * (sharedColumns + 1));
  let at = 0;
  for (const [k, group] of input.groups.entries()) {
    const { qr } = groups[k]!;
    const rows = group.noise.layout.rows;
    for (let j = 0; j < sharedColumns; j += 1) {
      const column = groupWithoutBorder(group, borderTau, {
        v: group.shared.subarray(j * rows, (j + 1) * rows),
        u: solved[j]!,
      });
      stacked.set(reduceForGroup(group, qr, column).subarray(qr.rank), j * total + at);
    }
    const response = new Float64Array(qr.rows);
    response.set(
      whiten(
        group.noise,
        groupWithoutBorder(group, borderTau, { v: group.own.response, u: solved[sharedColumns]! }),
      ),
    );
    for (const [m, { value, sigma }] of group.own.priors.entries()) response[rows + m] = value / sigma;
    applyQTransposed(qr, response);
    stacked.set(response.subarray(qr.rank), sharedColumns * total + at);
    at += rowsOf[k]!;
  }
  for (let j = 0; j <= sharedColumns; j += 1)
    stacked.set(
      solved[j]!.map((x) => -x),
      j * total + at,
    );
  at += size;
  for (const [m, { column, value, sigma }] of sharedPriors.entries()) {
    stacked[column * total + at + m] = 1 / sigma;
    stacked[sharedColumns * total + at + m] = value / sigma;
  }
  return { total, stacked };
}

/** Solves for γ, u and every β_k.
 * @param input - groups whose columns, own and shared, are independent
 * @returns coefficients, effects and the factors from which covariances follow
 * @accuracy condition × rounding, as one dense solution
 * @source Björck 1996, Numerical Methods for Least Squares Problems, section 6.3 */
export function eliminate(input: EliminationInput): Elimination {
  const { sharedColumns, borderTau } = input;
  const size = borderTau.length;
  const border: Border = {
    matrix: new Float64Array(size * size),
    sides: Array.from({ length: sharedColumns + 1 }, () => new Float64Array(size)),
  };
  const groups = input.groups.map((group) => reduceGroup(group, input, border));
  for (let s = 0; s < size; s += 1) border.matrix[s * size + s]! += 1;
  factorCholesky(border.matrix, size);
  for (const side of border.sides) {
    solveLower(border.matrix, size, side);
    solveLowerTransposed(border.matrix, size, side);
  }
  const { total, stacked } = stackBorder(input, groups, border.sides);
  const qr = factorQr(stacked.subarray(0, total * sharedColumns), total, sharedColumns);
  const response = stacked.slice(total * sharedColumns);
  applyQTransposed(qr, response);
  const shared = solveR(qr, response);
  const u = border.sides[sharedColumns]!.slice();
  for (let j = 0; j < sharedColumns; j += 1) {
    for (let s = 0; s < size; s += 1) u[s]! -= shared[j]! * border.sides[j]![s]!;
  }
  let logDet = logDeterminant(border.matrix, size) + logDetInformation(qr);
  for (const [k, group] of input.groups.entries())
    logDet += group.noise.logDet + logDetInformation(groups[k]!.qr);
  const borderShares = new Float64Array(size * sharedColumns);
  for (let j = 0; j < sharedColumns; j += 1) borderShares.set(border.sides[j]!, j * size);
  return {
    input,
    groups,
    borderInverse: invertCholesky(border.matrix, size),
    borderShares,
    qr,
    shared,
    coefficients: input.groups.map((group, k) =>
      ownCoefficients(group, groups[k]!.qr, { shared, u, borderTau }),
    ),
    borderEffects: u.map((value, s) => value * borderTau[s]!),
    chi2: dotFrom(response, response, qr.rank),
    logDet,
  };
}

interface BorderSolution {
  readonly shared: Float64Array;
  readonly u: Float64Array;
  readonly borderTau: Float64Array;
}

/** β_k once γ and u are known. */
function ownCoefficients(
  group: EliminationGroup,
  qr: QrFactor,
  { shared, u, borderTau }: BorderSolution,
): Float64Array {
  const rows = group.noise.layout.rows;
  const rest = groupWithoutBorder(group, borderTau, { v: group.own.response, u });
  for (let j = 0; j < shared.length; j += 1) {
    for (let i = 0; i < rows; i += 1) rest[i]! -= shared[j]! * group.shared[j * rows + i]!;
  }
  const whitened = new Float64Array(qr.rows);
  whitened.set(whiten(group.noise, rest));
  for (const [m, { value, sigma }] of group.own.priors.entries()) whitened[rows + m] = value / sigma;
  applyQTransposed(qr, whitened);
  return solveR(qr, whitened);
}
