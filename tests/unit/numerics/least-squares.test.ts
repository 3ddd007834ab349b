import { describe, expect, it } from 'vitest';
import { fitLeastSquares, type LeastSquaresFit, type LeastSquaresInput } from '@/lib/numerics/least-squares';
import { expectDigits, expectWithin } from '@/tests/support/numbers';
import reference from '@/tests/reference/least-squares.json';

/** Rows to a column-major design. */
const columnMajor = (rows: readonly (readonly number[])[]): Float64Array =>
  Float64Array.from((rows[0] ?? []).flatMap((_, j) => rows.map((row) => row[j] ?? NaN)));

function fit(input: LeastSquaresInput): LeastSquaresFit {
  const outcome = fitLeastSquares(input);
  if (outcome.kind === 'undetermined') throw new Error(JSON.stringify(outcome));
  return outcome;
}

interface NistSet {
  readonly model: string;
  readonly p: number;
  readonly x?: readonly number[];
  readonly X_without_constant?: readonly (readonly number[])[];
}

/** The rows of the certified model: a constant and the columns given, or powers of x, from the first where there is no
 * constant. */
function rowsOf({ model, p, x, X_without_constant: given }: NistSet): number[][] {
  if (given !== undefined) return given.map((row) => [1, ...row]);
  const first = model.includes('B0') ? 0 : 1;
  return (x ?? []).map((value) => Array.from({ length: p }, (_, j) => value ** (j + first)));
}

describe('the certified linear data sets of NIST', () => {
  it.each(reference.nist)('$name: coefficients and standard deviations have the digits asked', (set) => {
    const digits = set.name === 'Filip' ? 7 : 9;
    const found = fit({
      design: columnMajor(rowsOf(set)),
      columns: set.p,
      response: Float64Array.from(set.y),
      sigma: new Float64Array(set.y.length).fill(1),
    });
    const variance = found.degreesOfFreedom > 0 ? found.chi2 / found.degreesOfFreedom : NaN;
    for (const [j, value] of set.exact_coefficients.entries())
      expectDigits(found.coefficients[j] ?? NaN, value, digits);
    for (const [j, value] of set.exact_sd.entries())
      expectDigits(Math.sqrt(variance * (found.covariance[j * (set.p + 1)] ?? NaN)), value, digits);
    expectDigits(found.chi2, set.exact_rss, digits);
  });
});

describe('weighted least squares against numpy and mpmath', () => {
  it.each(reference.weighted.cases)('$name: all that is printed agrees to 1e-10', (set) => {
    const p = set.columns.length;
    const found = fit({
      design: columnMajor(set.X),
      columns: p,
      response: Float64Array.from(set.y),
      sigma: Float64Array.from(set.weights, (weight) => 1 / Math.sqrt(weight)),
    });
    for (const [j, value] of set.params.entries()) expectDigits(found.coefficients[j] ?? NaN, value, 10);
    for (const [j, row] of set.cov_unscaled.entries()) {
      for (const [k, value] of row.entries()) expectDigits(found.covariance[j * p + k] ?? NaN, value, 10);
    }
    for (const [i, value] of set.leverage.entries()) {
      expectWithin(found.leverage[i] ?? NaN, value, { absolute: 1e-10, unit: '' });
    }
    expectWithin(found.chi2, set.chi2, { absolute: 1e-10 * Math.max(1, set.chi2), unit: '' });
    expect(found.degreesOfFreedom).toBe(set.dof);
  });
});

describe('designs that do not determine their coefficients', () => {
  const inseparable: Readonly<Record<string, readonly (readonly string[])[]>> = {
    all_same_airmass: [['zp', 'k']],
    one_star_many_times: [['zp', 'c']],
    too_few: [['zp', 'k', 'c']],
    colour_proportional_to_airmass: [['zp', 'k', 'c']],
  };

  it.each(reference.weighted.degenerate)('$name: the columns that cannot be told apart are named', (set) => {
    const outcome = fitLeastSquares({
      design: columnMajor(set.X),
      columns: set.columns.length,
      response: Float64Array.from(set.X, (_, i) => i),
      sigma: new Float64Array(set.X.length).fill(0.01),
    });
    expect(outcome.kind).toBe('undetermined');
    const named =
      outcome.kind === 'undetermined'
        ? outcome.dependent.map((columns) => columns.map((j) => set.columns[j]))
        : [];
    expect(named).toEqual(inseparable[set.name]);
    expect(set.columns.length - named.length).toBe(set.rank);
  });

  it('a column of zeros is named alone', () => {
    const outcome = fitLeastSquares({
      design: Float64Array.of(1, 1, 1, 0, 0, 0),
      columns: 2,
      response: Float64Array.of(1, 2, 3),
      sigma: Float64Array.of(1, 1, 1),
    });
    expect(outcome).toEqual({ kind: 'undetermined', dependent: [[1]] });
  });
});

describe('what is no weighted least squares problem is refused', () => {
  const good: LeastSquaresInput = {
    design: Float64Array.of(1, 1, 1),
    columns: 1,
    response: Float64Array.of(1, 2, 3),
    sigma: Float64Array.of(1, 1, 1),
  };

  it.each<[string, Partial<LeastSquaresInput>]>([
    ['an error of zero', { sigma: Float64Array.of(1, 0, 1) }],
    ['an error that is not finite', { sigma: Float64Array.of(1, Infinity, 1) }],
    ['a missing error', { sigma: Float64Array.of(1, 1) }],
    ['a response that is not a number', { response: Float64Array.of(1, NaN, 3) }],
    ['a design that is not finite', { design: Float64Array.of(1, Infinity, 1) }],
    ['a design of other shape', { columns: 2 }],
  ])('%s', (_, wrong) => {
    expect(() => fitLeastSquares({ ...good, ...wrong })).toThrow(RangeError);
  });
});
