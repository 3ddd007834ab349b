import { describe, expect, it } from 'vitest';
import { createRandom } from '@/lib/numerics/random';
import { runsTest } from '@/lib/numerics/runs-test';
import { expectWithin } from '@/tests/support/numbers';

const seed = 20261201;

/** All orders of so many plus and minus ones. */
function orders(positive: number, negative: number): number[][] {
  if (positive === 0) return [new Array<number>(negative).fill(-1)];
  if (negative === 0) return [new Array<number>(positive).fill(1)];
  return [
    ...orders(positive - 1, negative).map((rest) => [1, ...rest]),
    ...orders(positive, negative - 1).map((rest) => [-1, ...rest]),
  ];
}

describe('the runs test', () => {
  it.each([
    [4, 4],
    [3, 6],
    [1, 5],
  ])('with %d and %d signs has the probabilities that counting all orders gives', (positive, negative) => {
    const all = orders(positive, negative);
    const counts = all.map((order) => runsTest(order).runs);
    for (const order of all) {
      const found = runsTest(order);
      const fewer = counts.filter((count) => count <= found.runs).length / all.length;
      const more = counts.filter((count) => count >= found.runs).length / all.length;
      expectWithin(found.probabilityOfFewer, fewer, { absolute: 1e-12, unit: '' });
      expectWithin(found.probabilityOfMore, more, { absolute: 1e-12, unit: '' });
    }
  });

  it('finds a slow drift and does not find what chance alone makes', () => {
    const random = createRandom(seed);
    const noise = Array.from({ length: 400 }, () => random.normal());
    expect(runsTest(noise).probabilityOfFewer).toBeGreaterThan(0.01);
    expect(runsTest(noise.map((value, i) => value + (i - 200) / 100)).probabilityOfFewer).toBeLessThan(1e-6);
    expect(runsTest(noise.map((value, i) => Math.abs(value) * (-1) ** i)).probabilityOfMore).toBeLessThan(
      1e-6,
    );
  });

  it('has the normal deviate of its probability, on the side where the runs lie', () => {
    const alike = [1, 1, 1, 1, -1, -1, -1, -1];
    // 2 of the 70 orders have two runs, and as many have eight: 0.02857 is exceeded at 1.9022 standard deviations.
    expectWithin(runsTest(alike).deviate, -1.9022, { absolute: 1e-4, unit: '' });
    expectWithin(runsTest([1, -1, 1, -1, 1, -1, 1, -1]).deviate, 1.9022, { absolute: 1e-4, unit: '' });
    const halves = Array.from({ length: 4000 }, (_, i) => (i < 2000 ? 1 : -1));
    expect(runsTest(halves).deviate).toBeLessThan(-30);
  });

  it('stays within 0 … 1 for ten thousand values', () => {
    const random = createRandom(seed, 1);
    const { probabilityOfFewer, probabilityOfMore } = runsTest(
      Array.from({ length: 10_000 }, () => random.normal()),
    );
    expectWithin(probabilityOfFewer + probabilityOfMore, 1, { absolute: 0.03, unit: '' });
    expect(probabilityOfFewer).toBeLessThanOrEqual(1);
    expect(probabilityOfMore).toBeGreaterThanOrEqual(0);
  });

  it('says nothing of values of one sign, of zeros, or of no values', () => {
    expect(runsTest([])).toMatchObject({ runs: 0, probabilityOfFewer: 1, probabilityOfMore: 1, deviate: 0 });
    expect(runsTest([0, 0])).toMatchObject({ positive: 0, negative: 0, runs: 0 });
    expect(runsTest([1, 0, 2])).toMatchObject({ positive: 2, runs: 1, probabilityOfFewer: 1 });
  });
});
