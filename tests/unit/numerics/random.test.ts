import { describe, expect, it } from 'vitest';
import { createRandom, xoshiro128 } from '@/lib/numerics/random';
import published from '@/tests/reference/xoshiro128.json';

const draw = (count: number, next: () => number): number[] => Array.from({ length: count }, next);
const mean = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length;
const moment = (values: readonly number[], order: number): number =>
  mean(values.map((value) => value ** order));

describe('random numbers', () => {
  it.each(published.cases)(
    'the generator gives the words of the published program ($source)',
    ({ state, words }) => {
      expect(draw(words.length, xoshiro128(Uint32Array.from(state)))).toEqual(words);
    },
  );

  it('a state of zeros is refused, because the generator would give zeros for ever', () => {
    expect(() => xoshiro128(new Uint32Array(4))).toThrow(RangeError);
    expect(() => xoshiro128(new Uint32Array([1, 2, 3]))).toThrow(RangeError);
  });

  it('the same seed gives the same numbers', () => {
    expect(draw(20, createRandom(7).normal)).toEqual(draw(20, createRandom(7).normal));
  });

  it('neighbouring seeds and streams give unrelated numbers', () => {
    const firsts: number[] = [];
    for (let seed = 0; seed < 40; seed += 1)
      for (let stream = 0; stream < 25; stream += 1) firsts.push(createRandom(seed, stream).uniform());
    expect(new Set(firsts).size).toBe(firsts.length);
    // 1,000 uniform numbers: the mean has a standard error of 0.0091, the variance of 0.0024.
    expect(Math.abs(mean(firsts) - 0.5)).toBeLessThan(0.037);
    expect(Math.abs(moment(firsts, 2) - mean(firsts) ** 2 - 1 / 12)).toBeLessThan(0.01);
    const pairs = firsts.slice(1).map((value, index) => (value - 0.5) * ((firsts[index] ?? 0) - 0.5) * 12);
    expect(Math.abs(mean(pairs))).toBeLessThan(0.13);
  });

  it('uniform numbers lie in 0 … 1 and fill ten bins evenly', () => {
    const values = draw(100_000, createRandom(11).uniform);
    expect(values.every((value) => value >= 0 && value < 1)).toBe(true);
    const bins = new Array<number>(10).fill(0);
    for (const value of values) bins[Math.floor(value * 10)] = (bins[Math.floor(value * 10)] ?? 0) + 1;
    const chi2 = bins.reduce((sum, count) => sum + (count - 10_000) ** 2 / 10_000, 0);
    // 9 degrees of freedom: 27.9 is exceeded once in a thousand; the seed is fixed.
    expect(chi2).toBeLessThan(27.9);
  });

  it('normal deviates have the moments of the normal distribution', () => {
    const values = draw(1_000_000, createRandom(3).normal);
    expect(Math.abs(mean(values))).toBeLessThan(4e-3);
    expect(Math.abs(moment(values, 2) - 1)).toBeLessThan(6e-3);
    expect(Math.abs(moment(values, 3))).toBeLessThan(0.016);
    expect(Math.abs(moment(values, 4) - 3)).toBeLessThan(0.04);
    const beyond3 = values.filter((value) => Math.abs(value) > 3).length / values.length;
    expect(Math.abs(beyond3 - 0.0026998)).toBeLessThan(2.1e-4);
  });

  it.each([
    ['a fraction', 1.5, 0],
    ['not a number', Number.NaN, 0],
    ['beyond 32 bits', 2 ** 32, 0],
    ['a negative stream', 1, -1],
  ])('a seed or stream that is %s is refused', (_what, seed, stream) => {
    expect(() => createRandom(seed, stream)).toThrow(RangeError);
  });
});
