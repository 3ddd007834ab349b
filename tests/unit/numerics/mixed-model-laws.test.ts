import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitMixedModel, type MixedModelFit, type MixedModelInput } from '@/lib/numerics/mixed-model';
import { createRandom } from '@/lib/numerics/random';
import { expectWithin } from '@/tests/support/numbers';
import { simulateGroups } from '@/tests/support/simulated-groups';

const seed = 20261201;
const numRuns = 25;
const estimate = { kind: 'estimate' } as const;

/** One group drawn from the model, all three columns its own. */
function drawn(of: number, change: Partial<MixedModelInput> = {}): MixedModelInput {
  const { groups, subjectSigma } = simulateGroups(
    {
      groups: 1,
      blocks: 8,
      rowsPerBlock: 5,
      subjects: 12,
      tau: 0.004,
      observation: 0.008,
      block: 0.01,
    },
    of,
  );
  const [group] = groups;
  if (group === undefined) throw new Error('There is a group.');
  const { sharedDesign, ...rest } = group;
  return {
    ...rest,
    design: Float64Array.from([...group.design, ...sharedDesign]),
    columns: 3,
    subjectSigma,
    ...change,
  };
}

function fit(input: MixedModelInput): MixedModelFit {
  const outcome = fitMixedModel(input);
  if (outcome.kind === 'undetermined') throw new Error(`undetermined: ${outcome.reason}`);
  return outcome;
}

/** The same rows in another order, or some of them. */
function taken(input: MixedModelInput, order: readonly number[]): MixedModelInput {
  const n = input.response.length;
  const pick = (values: Float64Array, from = 0): number[] => order.map((i) => values[from + i] ?? NaN);
  return {
    ...input,
    response: Float64Array.from(pick(input.response)),
    design: Float64Array.from([0, 1, 2].flatMap((j) => pick(input.design, j * n))),
    sigma: Float64Array.from(pick(input.sigma)),
    subject: Int32Array.from(order, (i) => input.subject[i] ?? NaN),
    block: input.block === null ? null : Int32Array.from(order, (i) => input.block?.[i] ?? NaN),
  };
}

function shuffled(n: number, of: number): number[] {
  const random = createRandom(of);
  return Array.from({ length: n }, (_, i) => [random.uniform(), i] as const)
    .sort(([a], [b]) => a - b)
    .map(([, i]) => i);
}

function expectAll(actual: ArrayLike<number>, expected: ArrayLike<number>, absolute: number): void {
  expect(actual).toHaveLength(expected.length);
  for (let i = 0; i < expected.length; i += 1)
    expectWithin(actual[i] ?? NaN, expected[i] ?? NaN, { absolute, unit: `at ${i}` });
}

const seeds = fc.integer({ min: 1, max: 1_000_000 });

describe('laws of the mixed model', () => {
  it('rows in another order give the same coefficients, covariance and components, and the same rows theirs', () => {
    fc.assert(
      fc.property(seeds, seeds, (of, by) => {
        const input = drawn(of);
        const order = shuffled(input.response.length, by);
        const [found, again] = [fit(input), fit(taken(input, order))];
        expectAll(again.coefficients, found.coefficients, 1e-8);
        expectAll(again.covariance, found.covariance, 1e-6 * (found.covariance[0] ?? NaN));
        expectWithin(again.criterion, found.criterion, { absolute: 1e-7, unit: '' });
        expectAll(
          again.marginalResiduals,
          order.map((i) => found.marginalResiduals[i] ?? NaN),
          1e-8,
        );
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
          response: times(input.response),
          sigma: times(input.sigma),
          subjectSigma: times(input.subjectSigma),
        });
        expectAll(scaled.coefficients, times(found.coefficients), 1e-7 * unit);
        for (const name of ['observationScatter', 'blockScatter'] as const) {
          expectWithin(scaled[name].sigma, unit * found[name].sigma, { absolute: 1e-6 * unit, unit: '' });
        }
        expectAll(
          scaled.covariance.map((value) => value / unit ** 2),
          found.covariance,
          1e-4 * (found.covariance[0] ?? NaN),
        );
        expectAll(scaled.deletionResiduals, found.deletionResiduals, 1e-3);
      }),
      { seed, numRuns },
    );
  });

  it('what a column explains moves its coefficient by as much and nothing else', () => {
    fc.assert(
      fc.property(
        seeds,
        fc.integer({ min: 0, max: 2 }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        (of, column, by) => {
          const input = drawn(of);
          const n = input.response.length;
          const found = fit(input);
          const moved = fit({
            ...input,
            response: input.response.map((y, i) => y + by * (input.design[column * n + i] ?? NaN)),
          });
          expectAll(
            moved.coefficients,
            found.coefficients.map((value, j) => (j === column ? value + by : value)),
            1e-7,
          );
          expectAll(moved.marginalResiduals, found.marginalResiduals, 1e-7);
        },
      ),
      { seed, numRuns },
    );
  });

  it('one more observation never raises a variance, however good or bad it is, at given components', () => {
    fc.assert(
      fc.property(
        seeds,
        fc.integer({ min: 0, max: 39 }),
        fc.constantFrom(1e-6, 0.001, 0.01, 1),
        (of, without, sigma) => {
          const held = { kind: 'hold', sigma: 0.007 } as const;
          const input = drawn(of, { observationScatter: held, blockScatter: held });
          const all = {
            ...input,
            sigma: input.sigma.map((value, i) => (i === without ? sigma : value)),
          };
          const rows = Array.from(all.response, (_, i) => i).filter((i) => i !== without);
          const [fewer, more] = [fit(taken(all, rows)), fit(all)];
          for (let j = 0; j < 3; j += 1) {
            expect(more.covariance[4 * j]).toBeLessThanOrEqual(
              (fewer.covariance[4 * j] ?? NaN) * (1 + 1e-12),
            );
          }
        },
      ),
      { seed, numRuns: 100 },
    );
  });

  it('a search that begins near its end has the same end', () => {
    fc.assert(
      fc.property(seeds, fc.double({ min: 0.3, max: 3, noNaN: true }), (of, off) => {
        const input = drawn(of);
        const found = fit(input);
        const { observation, block } = found.near;
        const again = fit({ ...input, near: { observation: off * observation, block: block / off } });
        expectWithin(again.criterion, found.criterion, { absolute: 1e-8, unit: '' });
        expectAll(again.coefficients, found.coefficients, 1e-7);
      }),
      { seed, numRuns },
    );
  });
});

describe('the edges of the mixed model', () => {
  const bare = (rows: number): MixedModelInput => {
    const input = drawn(3, { subjectSigma: new Float64Array(12), block: null });
    const few = taken(
      input,
      Array.from({ length: rows }, (_, i) => 7 * i),
    );
    return { ...few, sigma: new Float64Array(rows) };
  };

  it('rows without errors and none to spare have no scale; one more gives one', () => {
    expect(fitMixedModel(bare(3))).toEqual({ kind: 'undetermined', reason: 'no-scale', dependent: [] });
    expect(fit(bare(4)).observationScatter.sigma).toBeGreaterThan(0);
  });

  it('a scatter held at zero is no scale either', () => {
    const held = { ...bare(5), observationScatter: { kind: 'hold', sigma: 0 } as const };
    expect(fitMixedModel(held)).toEqual({ kind: 'undetermined', reason: 'no-scale', dependent: [] });
  });

  it('held components stay, are said to be held, and leave no uncertainty in the errors', () => {
    const found = fit(
      drawn(4, {
        observationScatter: { kind: 'hold', sigma: 0.009 },
        blockScatter: { kind: 'hold', sigma: 0.012 },
      }),
    );
    expect(found.observationScatter).toEqual({ sigma: 0.009, errSigma: null, state: 'held' });
    expect(found.blockScatter).toEqual({ sigma: 0.012, errSigma: null, state: 'held' });
    expect(Array.from(found.degreesOfFreedom)).toEqual([Infinity, Infinity, Infinity]);
    expect(found.termination).toEqual({ reason: 'fixed', iterations: 0 });
  });

  it('components held where the search would have ended give its criterion, and others a higher one', () => {
    const free = fit(drawn(5));
    const at = (factor: number): number =>
      fit(
        drawn(5, {
          observationScatter: { kind: 'hold', sigma: factor * free.observationScatter.sigma },
          blockScatter: { kind: 'hold', sigma: free.blockScatter.sigma / factor },
        }),
      ).criterion;
    expectWithin(at(1), free.criterion, { absolute: 1e-9, unit: '' });
    expect(at(1.1)).toBeGreaterThan(free.criterion);
    expect(at(0.9)).toBeGreaterThan(free.criterion);
  });

  it('blocks of one row each have no scatter that could be told from that of the rows', () => {
    const input = drawn(6);
    const rows = Array.from({ length: 8 }, (_, b) => 5 * b);
    expect(fit(taken(input, rows)).blockScatter.state).toBe('not-separable');
  });

  it('as many coefficients as rows leave no freedom, and no scatter', () => {
    const found = fit(taken(drawn(7), [0, 12, 31]));
    expect(found.termination.reason).toBe('no-freedom');
    expect([found.observationScatter.sigma, found.blockScatter.sigma]).toEqual([0, 0]);
  });

  it('columns that cannot be told apart are named, unless a prior tells them', () => {
    const input = drawn(8);
    const n = input.response.length;
    const twice = Float64Array.from(input.design);
    for (let i = 0; i < n; i += 1) twice[2 * n + i] = 3 * (twice[n + i] ?? NaN) - 2;
    expect(fitMixedModel({ ...input, design: twice })).toEqual({
      kind: 'undetermined',
      reason: 'inseparable',
      dependent: [[0, 1, 2]],
    });
    const told = fit({ ...input, design: twice, priors: [{ column: 2, value: 0.4, sigma: 0.01 }] });
    expectWithin(told.coefficients[2] ?? NaN, 0.4, { absolute: 1e-9, unit: '' });
    expectWithin(told.priorLeverage[0] ?? NaN, 1, { absolute: 1e-9, unit: '' });
  });

  const good = drawn(9);
  const changed = (values: Float64Array, value: number): Float64Array =>
    values.map((old, i) => (i === 2 ? value : old));
  it.each<[string, Partial<MixedModelInput>]>([
    ['a design of another shape', { columns: 2 }],
    ['errors of another length', { sigma: new Float64Array(3) }],
    ['a response that is not a number', { response: changed(good.response, NaN) }],
    ['a design that is not finite', { design: changed(good.design, Infinity) }],
    ['a negative error', { sigma: changed(good.sigma, -0.001) }],
    ['a negative error of a subject', { subjectSigma: changed(good.subjectSigma, -1) }],
    ['a subject without an error', { subject: good.subject.map(() => 12) }],
    ['a block of negative number', { block: good.subject.map(() => -1) }],
    ['a prior on a column that is not there', { priors: [{ column: 3, value: 0, sigma: 1 }] }],
    ['a prior that is certain', { priors: [{ column: 0, value: 0, sigma: 0 }] }],
    ['a negative scatter', { observationScatter: { kind: 'hold', sigma: -1 } }],
  ])('%s is refused', (_, change) => {
    expect(() =>
      fitMixedModel({ ...good, observationScatter: estimate, blockScatter: estimate, ...change }),
    ).toThrow(RangeError);
  });
});
