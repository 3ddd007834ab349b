import { describe, expect, it } from 'vitest';
import { createRandom } from '@/lib/numerics/random';
import { fitRobust, median, type RobustFit, type RobustInput, scaleByMad } from '@/lib/numerics/robust';
import { expectWithin } from '@/tests/support/numbers';
import reference from '@/tests/reference/least-squares.json';

const tolerance = { absolute: 1e-6, unit: '' } as const;
const { cases, location_example: location } = reference.robust;

function fit(input: RobustInput): RobustFit {
  const outcome = fitRobust(input);
  if (outcome.kind === 'undetermined') throw new Error(JSON.stringify(outcome));
  return outcome;
}

type Case = (typeof cases)[number];

/** The whitened data of a case; those with a held scale have them of the case before. */
function dataOf(one: Case): { X: readonly (readonly number[])[]; y: readonly number[] } {
  const source = one.X === undefined ? cases.find(({ name }) => name === one.same_data_as) : one;
  return { X: source?.X ?? [], y: source?.y ?? [] };
}

function inputOf(one: Case): RobustInput {
  const { X, y } = dataOf(one);
  const columns = X[0]?.length ?? 0;
  return {
    design: Float64Array.from(
      { length: columns * X.length },
      (_, at) => X[at % X.length]?.[Math.floor(at / X.length)] ?? NaN,
    ),
    columns,
    response: Float64Array.from(y),
    bisquare: one.tuning_constant,
    scale: one.same_data_as === undefined ? { kind: 'mad' } : { kind: 'held', value: one.scale },
    start: null,
    anchored: null,
  };
}

describe('M-estimates against a general statistics library', () => {
  it.each(cases.filter(({ kind }) => kind !== 'huber'))(
    '$name: coefficients, scale and weights agree',
    (one) => {
      const input = inputOf(one);
      // The case with a held scale was started from Huber's solution, the others from least squares.
      const before = cases.find(({ name, kind }) => name === one.name && kind === 'huber');
      const start = input.scale.kind === 'held' ? Float64Array.from(before?.params ?? []) : null;
      const found = fit({ ...input, start });
      expect(found.termination.reason).toBe('converged');
      for (const [j, value] of one.params.entries()) {
        const size = Math.max(1, Math.abs(value));
        expectWithin((found.coefficients[j] ?? NaN) / size, value / size, tolerance);
      }
      expectWithin(found.scale, one.scale, tolerance);
      for (const [i, weight] of one.weights.entries())
        expectWithin(found.weights[i] ?? NaN, weight, tolerance);
    },
  );
});

describe('median and median absolute deviation', () => {
  it('agree with the printed example, which one outlier does not move', () => {
    expectWithin(median(location.values), location.median, { absolute: 1e-12, unit: 'mag' });
    expectWithin(scaleByMad(location.values, location.median), location.mad_sigma, {
      absolute: 1e-9,
      unit: 'mag',
    });
  });

  it('the median of an odd number is the middle one, and nothing has none', () => {
    expect(median([3, 1, 2])).toBe(2);
    expect(() => median([])).toThrow(RangeError);
  });
});

describe('rows that are priors, rows without scatter, rows that say too little', () => {
  const random = createRandom(20261201, 3);
  const n = 40;
  const x = Array.from({ length: n }, () => random.uniform());
  const line = (outliers: number): RobustInput => ({
    design: Float64Array.from([...x.map(() => 1), ...x]),
    columns: 2,
    response: Float64Array.from(x, (value, i) => 2 + 3 * value + (i < outliers ? 50 : 0)),
    bisquare: 4.685,
    scale: { kind: 'mad' },
    start: null,
    anchored: null,
  });

  it('an anchored row keeps its weight however far off it is', () => {
    const anchored = new Uint8Array(n);
    anchored[0] = 1;
    const input = line(1);
    const noisy = { ...input, response: input.response.map((y) => y + 0.1 * random.normal()) };
    expect(fit({ ...noisy, anchored }).weights[0]).toBe(1);
    expect(fit(noisy).weights[0]).toBe(0);
  });

  it('an exact fit ends as such and names no scale', () => {
    const found = fit({ ...line(3), start: Float64Array.of(2, 3) });
    expect(found.termination.reason).toBe('exact-fit');
    expectWithin(found.coefficients[1] ?? NaN, 3, { absolute: 1e-12, unit: '' });
  });

  it('columns that cannot be told apart are named', () => {
    const input = { ...line(0), design: new Float64Array(2 * n).fill(1) };
    expect(fitRobust(input)).toEqual({ kind: 'undetermined', dependent: [[0, 1]] });
  });

  it('a number that is not finite and a design of other shape are refused', () => {
    expect(() => fitRobust({ ...line(0), response: new Float64Array(n).fill(NaN) })).toThrow(RangeError);
    expect(() => fitRobust({ ...line(0), columns: 3 })).toThrow(RangeError);
  });
});
