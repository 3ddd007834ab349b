import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  fitJointMixedModel,
  type JointGroup,
  type JointMixedModelFit,
  type JointMixedModelInput,
} from '@/lib/numerics/joint-mixed-model';
import { createRandom } from '@/lib/numerics/random';
import { expectWithin } from '@/tests/support/numbers';
import { simulateGroups } from '@/tests/support/simulated-groups';

const seed = 20261201;
const numRuns = 15;
const seeds = fc.integer({ min: 1, max: 1_000_000 });

const drawn = (of: number): JointMixedModelInput =>
  simulateGroups(
    { groups: 4, blocks: 7, rowsPerBlock: 5, subjects: 12, tau: 0.004, observation: 0.008, block: 0.01 },
    of,
  );

/** With scatters that are known, so that everything follows from linear algebra. */
const held = (input: JointMixedModelInput): JointMixedModelInput => ({
  ...input,
  groups: input.groups.map((group) => ({
    ...group,
    observationScatter: { kind: 'hold', sigma: 0.008 },
    blockScatter: { kind: 'hold', sigma: 0.01 },
  })),
});

function fit(input: JointMixedModelInput): JointMixedModelFit {
  const outcome = fitJointMixedModel(input);
  if (outcome.kind === 'undetermined') throw new Error(`undetermined: ${outcome.reason}`);
  return outcome;
}

function expectAll(actual: ArrayLike<number>, expected: ArrayLike<number>, absolute: number): void {
  expect(actual).toHaveLength(expected.length);
  for (let i = 0; i < expected.length; i += 1)
    expectWithin(actual[i] ?? NaN, expected[i] ?? NaN, { absolute, unit: `at ${i}` });
}

const varianceOf = ({ sharedCovariance }: JointMixedModelFit): number => sharedCovariance[0] ?? NaN;

/** Rows of a group in another order. */
function shuffled(group: JointGroup, by: number): JointGroup {
  const random = createRandom(by);
  const rows = group.response.length;
  const order = Array.from({ length: rows }, (_, i) => [random.uniform(), i] as const)
    .sort(([a], [b]) => a - b)
    .map(([, i]) => i);
  const pick = (values: Float64Array): Float64Array =>
    Float64Array.from({ length: values.length }, (_, at) => {
      const column = Math.floor(at / rows) * rows;
      return values[column + (order[at % rows] ?? NaN)] ?? NaN;
    });
  return {
    ...group,
    response: pick(group.response),
    design: pick(group.design),
    sharedDesign: pick(group.sharedDesign),
    sigma: pick(group.sigma),
    subject: Int32Array.from(order, (i) => group.subject[i] ?? NaN),
    block: group.block && Int32Array.from(order, (i) => group.block?.[i] ?? NaN),
  };
}

describe('laws of the joint mixed model', () => {
  it('groups and their rows in another order give the same', () => {
    fc.assert(
      fc.property(seeds, seeds, (of, by) => {
        const input = drawn(of);
        const found = fit(input);
        const again = fit({ ...input, groups: input.groups.map((group) => shuffled(group, by)).reverse() });
        expectAll(again.shared, found.shared, 1e-8);
        expectWithin(varianceOf(again) / varianceOf(found), 1, { absolute: 1e-6, unit: '' });
        expectAll(again.subjectEffects, found.subjectEffects, 1e-8);
        expectWithin(again.criterion, found.criterion, { absolute: 1e-6, unit: '' });
        for (const [k, group] of [...again.groups].reverse().entries())
          expectAll(group.coefficients, found.groups[k]?.coefficients ?? [], 1e-8);
      }),
      { seed, numRuns },
    );
  });

  it('a zero point added to one group moves its own and nothing else', () => {
    fc.assert(
      fc.property(seeds, fc.double({ min: -3, max: 3, noNaN: true }), (of, by) => {
        const input = drawn(of);
        const found = fit(input);
        const moved = fit({
          ...input,
          groups: input.groups.map((group, k) =>
            k === 1 ? { ...group, response: group.response.map((y) => y + by) } : group,
          ),
        });
        expectAll(moved.shared, found.shared, 1e-7);
        for (const [k, group] of moved.groups.entries()) {
          const before = found.groups[k]?.coefficients ?? new Float64Array(0);
          expectAll(
            group.coefficients,
            before.map((value, j) => (k === 1 && j === 0 ? value + by : value)),
            1e-7,
          );
        }
      }),
      { seed, numRuns },
    );
  });

  it('magnitudes in another unit give all magnitudes in that unit', () => {
    fc.assert(
      fc.property(seeds, fc.double({ min: 0.01, max: 100, noNaN: true }), (of, unit) => {
        const input = drawn(of);
        const times = (values: Float64Array): Float64Array => values.map((value) => unit * value);
        const found = fit(input);
        const scaled = fit({
          ...input,
          subjectSigma: times(input.subjectSigma),
          groups: input.groups.map((group) => ({
            ...group,
            response: times(group.response),
            sigma: times(group.sigma),
          })),
        });
        expectAll(scaled.shared, times(found.shared), 1e-7 * unit);
        expectWithin(varianceOf(scaled) / varianceOf(found) / unit ** 2, 1, { absolute: 1e-4, unit: '' });
      }),
      { seed, numRuns },
    );
  });

  it('one group more, or one of its rows made perfect, never raises the variance of what all share', () => {
    fc.assert(
      fc.property(seeds, fc.integer({ min: 0, max: 34 }), (of, row) => {
        const input = held(drawn(of));
        const found = varianceOf(fit(input));
        const fewer = varianceOf(fit({ ...input, groups: input.groups.slice(1) }));
        expect(found).toBeLessThanOrEqual(fewer * (1 + 1e-9));
        const perfect = varianceOf(
          fit({
            ...input,
            groups: input.groups.map((group, k) =>
              k === 0 ? { ...group, sigma: group.sigma.map((s, i) => (i === row ? 0 : s)) } : group,
            ),
          }),
        );
        expect(perfect).toBeLessThanOrEqual(found * (1 + 1e-9));
      }),
      { seed, numRuns },
    );
  });
});
