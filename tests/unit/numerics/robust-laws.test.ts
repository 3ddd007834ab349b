import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitTrimmed, type TrimmedFit, type TrimmedInput } from '@/lib/numerics/least-trimmed-squares';
import { createRandom } from '@/lib/numerics/random';
import { fitRobust, type RobustFit, type RobustInput } from '@/lib/numerics/robust';
import { expectWithin } from '@/tests/support/numbers';

const seed = 20261201;
const numRuns = 30;
const n = 40;
const columns = 3;
/** The rows that lie far off. */
const spoilt = 8;

interface Rows {
  readonly design: Float64Array;
  readonly response: Float64Array;
}

/** A plane of unit scatter with some rows far off. */
function drawn(of: number): Rows {
  const random = createRandom(of);
  const design = Float64Array.from({ length: n * columns }, (_, at) => (at < n ? 1 : random.normal()));
  const response = Float64Array.from({ length: n }, (_, i) => {
    const off = i < spoilt ? 30 + 5 * random.normal() : 0;
    return 2 - (design[n + i] ?? NaN) + 3 * (design[2 * n + i] ?? NaN) + random.normal() + off;
  });
  return { design, response };
}

const trimmedInput = (rows: Rows): TrimmedInput => ({
  ...rows,
  columns,
  anchored: null,
  subsets: 60,
  random: createRandom(7),
});

function trimmed(rows: Rows): TrimmedFit {
  const outcome = fitTrimmed(trimmedInput(rows));
  if (outcome.kind === 'undetermined') throw new Error('undetermined');
  return outcome;
}

/** Tukey's bisquare from the trimmed start, as a night begins. */
function bisquare(rows: Rows, change: Partial<RobustInput> = {}): RobustFit {
  const outcome = fitRobust({
    ...rows,
    columns,
    bisquare: 4.685,
    scale: { kind: 'mad' },
    start: trimmed(rows).coefficients,
    anchored: null,
    ...change,
  });
  if (outcome.kind === 'undetermined') throw new Error('undetermined');
  return outcome;
}

const fits = [
  ['least trimmed squares', trimmed],
  ['bisquare', bisquare],
] as const;

function expectAll(actual: ArrayLike<number>, expected: ArrayLike<number>, absolute: number): void {
  expect(actual).toHaveLength(expected.length);
  for (let i = 0; i < expected.length; i += 1)
    expectWithin(actual[i] ?? NaN, expected[i] ?? NaN, { absolute, unit: `at ${i}` });
}

const seeds = fc.integer({ min: 1, max: 1_000_000 });
const amounts = fc.double({ min: -5, max: 5, noNaN: true });

describe.each(fits)('laws of %s', (_, fit) => {
  it('what the columns explain moves the coefficients by as much', () => {
    fc.assert(
      fc.property(seeds, fc.array(amounts, { minLength: columns, maxLength: columns }), (of, by) => {
        const { design, response } = drawn(of);
        const moved = response.map((y, i) =>
          by.reduce((sum, b, j) => sum + b * (design[j * n + i] ?? NaN), y),
        );
        const found = fit({ design, response });
        const again = fit({ design, response: moved });
        expectAll(
          again.coefficients,
          found.coefficients.map((value, j) => value + (by[j] ?? NaN)),
          1e-6,
        );
        expectWithin(again.scale, found.scale, { absolute: 1e-6, unit: '' });
      }),
      { seed, numRuns },
    );
  });

  it('a response in another unit gives coefficients and scale in that unit', () => {
    fc.assert(
      fc.property(seeds, fc.double({ min: 0.01, max: 100, noNaN: true }), (of, unit) => {
        const { design, response } = drawn(of);
        const found = fit({ design, response });
        const again = fit({ design, response: response.map((y) => unit * y) });
        expectAll(
          again.coefficients,
          found.coefficients.map((value) => unit * value),
          1e-6 * unit,
        );
        expectWithin(again.scale, unit * found.scale, { absolute: 1e-6 * unit, unit: '' });
      }),
      { seed, numRuns },
    );
  });

  it('rows far off may lie anywhere: how far makes no difference', () => {
    fc.assert(
      fc.property(seeds, fc.double({ min: 1e3, max: 1e7, noNaN: true }), (of, far) => {
        const { design, response } = drawn(of);
        const gross = (by: number): Rows => ({
          design,
          response: response.map((y, i) => (i < spoilt ? by : y)),
        });
        expectAll(fit(gross(far)).coefficients, fit(gross(2 * far)).coefficients, 1e-6);
      }),
      { seed, numRuns },
    );
  });
});

describe('laws of the bisquare alone', () => {
  it('rows without weight may be left out', () => {
    fc.assert(
      fc.property(seeds, (of) => {
        const rows = drawn(of);
        const found = bisquare(rows, { scale: { kind: 'held', value: 1 } });
        const kept = [...found.weights.keys()].filter((i) => (found.weights[i] ?? NaN) > 0);
        expect(kept.length).toBeLessThan(n);
        const outcome = fitRobust({
          design: Float64Array.from(
            Array.from({ length: columns }, (_, j) => kept.map((i) => rows.design[j * n + i] ?? NaN)).flat(),
          ),
          response: Float64Array.from(kept, (i) => rows.response[i] ?? NaN),
          columns,
          bisquare: 4.685,
          scale: { kind: 'held', value: 1 },
          start: found.coefficients,
          anchored: null,
        });
        if (outcome.kind === 'undetermined') throw new Error('undetermined');
        expectAll(outcome.coefficients, found.coefficients, 1e-8);
      }),
      { seed, numRuns },
    );
  });
});
