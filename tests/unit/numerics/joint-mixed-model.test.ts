import { describe, expect, it } from 'vitest';
import {
  fitJointMixedModel,
  type JointMixedModelFit,
  type JointMixedModelInput,
} from '@/lib/numerics/joint-mixed-model';
import { fitMixedModel } from '@/lib/numerics/mixed-model';
import { solveDense } from '@/tests/support/dense-mixed-model';
import { expectWithin } from '@/tests/support/numbers';
import { simulateGroups } from '@/tests/support/simulated-groups';

const small = {
  groups: 3,
  blocks: 5,
  rowsPerBlock: 6,
  subjects: 9,
  tau: 0.004,
  observation: 0.006,
  block: 0.01,
};

function fit(input: JointMixedModelInput): JointMixedModelFit {
  const outcome = fitJointMixedModel(input);
  if (outcome.kind === 'undetermined') throw new Error(`undetermined: ${JSON.stringify(outcome)}`);
  return outcome;
}

const scattersOf = (found: JointMixedModelFit): { observation: number; block: number }[] =>
  found.groups.map(({ observationScatter, blockScatter }) => ({
    observation: observationScatter.sigma,
    block: blockScatter.sigma,
  }));

function expectAll(actual: ArrayLike<number>, expected: ArrayLike<number>, absolute: number): void {
  expect(actual).toHaveLength(expected.length);
  for (let i = 0; i < expected.length; i += 1)
    expectWithin(actual[i] ?? NaN, expected[i] ?? NaN, { absolute, unit: `at ${i}` });
}

/** Everything that the solver says against plain matrix algebra over all rows at once. */
function expectDense(input: JointMixedModelInput, found: JointMixedModelFit): void {
  const dense = solveDense(input, scattersOf(found));
  expectWithin(found.criterion, dense.criterion, { absolute: 1e-7, unit: '' });
  expectWithin(found.chi2, dense.chi2, { absolute: 1e-7, unit: '' });
  expectAll(found.shared, dense.coefficients.slice(dense.sharedAt), 1e-8);
  expectAll(found.subjectEffects, dense.subjectEffects, 1e-9);
  const sizes = Array.from({ length: dense.coefficients.length }, (_, j) =>
    Math.sqrt(dense.covariance.get(j, j)),
  );
  const q = input.sharedColumns;
  const relative = (j: number, k: number, value: number): void => {
    const scale = (sizes[j] ?? NaN) * (sizes[k] ?? NaN);
    expectWithin(value / scale, dense.covariance.get(j, k) / scale, {
      absolute: 1e-8,
      unit: `of ${j}, ${k}`,
    });
  };
  for (let j = 0; j < q; j += 1)
    for (let k = 0; k < q; k += 1)
      relative(dense.sharedAt + j, dense.sharedAt + k, found.sharedCovariance[j * q + k] ?? NaN);
  for (const [g, group] of found.groups.entries()) {
    const given = input.groups[g];
    if (given === undefined) throw new Error('a group too many');
    const row = dense.rowOf[g] ?? NaN;
    const n = given.response.length;
    const p = given.columns;
    const places = [
      ...Array.from({ length: p }, (_, j) => (dense.columnOf[g] ?? NaN) + j),
      ...Array.from({ length: q }, (_, j) => dense.sharedAt + j),
    ];
    expectAll(
      group.coefficients,
      places.slice(0, p).map((j) => dense.coefficients[j] ?? NaN),
      1e-8,
    );
    for (const [a, j] of places.entries())
      for (const [b, k] of places.entries()) relative(j, k, group.covariance[a * (p + q) + b] ?? NaN);
    expectAll(group.marginalResiduals, dense.residuals.slice(row, row + n), 1e-9);
    expectAll(group.leverage, dense.leverage.slice(row, row + n), 1e-8);
    const v = dense.projected.slice(row, row + n);
    const observation = group.observationScatter.sigma;
    expectAll(
      group.conditionalResiduals,
      v.map((value, i) => ((given.sigma[i] ?? NaN) ** 2 + observation ** 2) * value),
      1e-9,
    );
    expectAll(
      group.deletionResiduals,
      v.map((value, i) => value / Math.sqrt(dense.projection.get(row + i, row + i))),
      1e-6,
    );
    const effects = new Array<number>(group.blockEffects.length).fill(0);
    for (const [i, value] of v.entries()) {
      const b = given.block?.[i] ?? NaN;
      if (given.block !== null) effects[b] = (effects[b] ?? NaN) + group.blockScatter.sigma ** 2 * value;
    }
    expectAll(group.blockEffects, effects, 1e-9);
  }
}

describe('many groups together against plain matrix algebra', () => {
  it.each([1, 2, 3, 4])(
    'seed %d: coefficients, covariances, effects and residuals are those of one dense solution',
    (seed) => {
      const input = simulateGroups(small, seed);
      expectDense(input, fit(input));
    },
  );

  it('with priors on own and on shared columns', () => {
    const input = simulateGroups(small, 5);
    const prior = { column: 1, value: 0.14, sigma: 0.01 };
    const withPriors = {
      ...input,
      groups: input.groups.map((group, k) => ({ ...group, priors: k === 1 ? [] : [prior] })),
      sharedPriors: [{ column: 0, value: -0.04, sigma: 0.003 }],
    };
    expectDense(withPriors, fit(withPriors));
  });

  it('where some groups have no blocks, some subjects no error and some but one row', () => {
    const input = simulateGroups({ ...small, subjects: 25 }, 6);
    const mixed = {
      ...input,
      subjectSigma: input.subjectSigma.map((tau, s) => (s % 3 === 0 ? 0 : tau * (1 + s / 10))),
      groups: input.groups.map((group, k) => (k === 0 ? { ...group, block: null } : group)),
    };
    expectDense(mixed, fit(mixed));
  });

  it('without shared columns, which joins the groups by their subjects alone', () => {
    const input = simulateGroups(small, 7);
    const apart = {
      ...input,
      sharedColumns: 0,
      groups: input.groups.map((group) => ({ ...group, sharedDesign: new Float64Array(0) })),
    };
    expectDense(apart, fit(apart));
  });
});

describe('one group alone', () => {
  it('has the answer of the mixed model, whether a column is its own or shared', () => {
    const input = simulateGroups({ ...small, groups: 1, blocks: 8 }, 8);
    for (const refinements of [0, 2]) {
      const joint = fit({ ...input, refinements });
      const [group] = input.groups;
      if (group === undefined) throw new Error('no group');
      const alone = fitMixedModel({
        ...group,
        design: Float64Array.from([...group.design, ...group.sharedDesign]),
        columns: 3,
        subjectSigma: input.subjectSigma,
      });
      if (alone.kind === 'undetermined') throw new Error(alone.reason);
      const [found] = joint.groups;
      expectAll([...(found?.coefficients ?? []), ...joint.shared], alone.coefficients, 1e-9);
      expectAll(found?.covariance ?? [], alone.covariance, 1e-9 * (alone.covariance[0] ?? NaN));
      expectAll(found?.degreesOfFreedom ?? [], alone.degreesOfFreedom, 1e-5);
      expectAll(joint.subjectEffects, alone.subjectEffects, 1e-9);
      expectAll(found?.leverage ?? [], alone.leverage, 1e-9);
      expectWithin(joint.criterion, alone.criterion, { absolute: 1e-9, unit: '' });
    }
  });
});
