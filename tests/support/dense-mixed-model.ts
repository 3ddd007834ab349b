import { inverse, LuDecomposition, Matrix } from 'ml-matrix';
import { type JointGroup, type JointMixedModelInput } from '@/lib/numerics/joint-mixed-model';

/** A joint mixed model written out: one covariance of all rows, one design of all columns, plain matrix algebra. */
export interface DenseModel {
  readonly coefficients: readonly number[];
  readonly covariance: Matrix;
  readonly criterion: number;
  readonly chi2: number;
  readonly subjectEffects: readonly number[];
  /** V⁻¹, and P y and P over all rows. */
  readonly inverse: Matrix;
  readonly projected: readonly number[];
  readonly projection: Matrix;
  readonly residuals: readonly number[];
  readonly leverage: readonly number[];
  /** First row and first own column of each group; the shared columns come last. */
  readonly rowOf: readonly number[];
  readonly columnOf: readonly number[];
  readonly sharedAt: number;
}

interface Held {
  readonly observation: number;
  readonly block: number;
}

const heldOf = ({ observationScatter, blockScatter }: JointGroup): Held => ({
  observation: observationScatter.kind === 'hold' ? observationScatter.sigma : NaN,
  block: blockScatter.kind === 'hold' ? blockScatter.sigma : NaN,
});

const logDet = (matrix: Matrix): number => {
  const lu = new LuDecomposition(matrix);
  return lu.upperTriangularMatrix.diagonal().reduce((sum, x) => sum + Math.log(Math.abs(x)), 0);
};

/** Solves at the scatters that the groups hold, as given or as found.
 * @param scatters - standard deviations to use instead of the groups' own rules */
export function solveDense(input: JointMixedModelInput, scatters?: readonly Held[]): DenseModel {
  const { groups, sharedColumns, sharedPriors, subjectSigma } = input;
  const rowOf: number[] = [];
  const columnOf: number[] = [];
  let rows = 0;
  let own = 0;
  for (const group of groups) {
    rowOf.push(rows);
    columnOf.push(own);
    rows += group.response.length;
    own += group.columns;
  }
  const columns = own + sharedColumns;
  const X = Matrix.zeros(rows, columns);
  const y = Matrix.zeros(rows, 1);
  const V = Matrix.zeros(rows, rows);
  const subjects: number[] = [];
  const priors: { column: number; value: number; sigma: number }[] = sharedPriors.map((prior) => ({
    ...prior,
    column: own + prior.column,
  }));
  for (const [k, group] of groups.entries()) {
    const n = group.response.length;
    const at = rowOf[k] ?? NaN;
    const { observation, block } = scatters?.[k] ?? heldOf(group);
    for (const prior of group.priors) priors.push({ ...prior, column: (columnOf[k] ?? NaN) + prior.column });
    for (let i = 0; i < n; i += 1) {
      y.set(at + i, 0, group.response[i] ?? NaN);
      subjects.push(group.subject[i] ?? NaN);
      for (let j = 0; j < group.columns; j += 1)
        X.set(at + i, (columnOf[k] ?? NaN) + j, group.design[j * n + i] ?? NaN);
      for (let j = 0; j < sharedColumns; j += 1) X.set(at + i, own + j, group.sharedDesign[j * n + i] ?? NaN);
      V.set(at + i, at + i, (group.sigma[i] ?? NaN) ** 2 + observation ** 2);
    }
    for (let i = 0; i < n; i += 1) {
      for (let j = 0; j < n; j += 1) {
        if (group.block !== null && group.block[i] === group.block[j])
          V.set(at + i, at + j, V.get(at + i, at + j) + block ** 2);
      }
    }
  }
  for (const [i, s] of subjects.entries()) {
    for (const [j, t] of subjects.entries())
      if (s === t) V.set(i, j, V.get(i, j) + (subjectSigma[s] ?? NaN) ** 2);
  }
  const Vi = inverse(V);
  const information = X.transpose().mmul(Vi).mmul(X);
  const side = X.transpose().mmul(Vi).mmul(y);
  let chi2 = 0;
  for (const { column, value, sigma } of priors) {
    information.set(column, column, information.get(column, column) + 1 / sigma ** 2);
    side.set(column, 0, side.get(column, 0) + value / sigma ** 2);
  }
  const covariance = inverse(information);
  const beta = covariance.mmul(side);
  for (const { column, value, sigma } of priors) chi2 += ((value - beta.get(column, 0)) / sigma) ** 2;
  const rest = Matrix.sub(y, X.mmul(beta));
  const v = Vi.mmul(rest);
  chi2 += rest.transpose().mmul(v).get(0, 0);
  const G = Vi.mmul(X);
  const projection = Matrix.sub(Vi, G.mmul(covariance).mmul(G.transpose()));
  const effects = new Array<number>(subjectSigma.length).fill(0);
  for (const [i, s] of subjects.entries())
    effects[s] = (effects[s] ?? NaN) + (subjectSigma[s] ?? NaN) ** 2 * v.get(i, 0);
  return {
    coefficients: beta.to1DArray(),
    covariance,
    criterion: logDet(V) + logDet(information) + chi2,
    chi2,
    subjectEffects: effects,
    inverse: Vi,
    projected: v.to1DArray(),
    projection,
    residuals: rest.to1DArray(),
    leverage: X.mmul(covariance).mmul(G.transpose()).diagonal(),
    rowOf,
    columnOf,
    sharedAt: own,
  };
}
