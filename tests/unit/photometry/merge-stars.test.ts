import { describe, expect, it } from 'vitest';
import { radPerDeg } from '@/lib/astro/angles';
import { mergeStars, nameOfPosition, type TableStars } from '@/lib/photometry/merge-stars';
import { readTableFlag } from '@/lib/photometry/table-flags';
import { expectWithin } from '@/tests/support/numbers';

type Star = readonly [key: string, ra?: number, dec?: number, n?: number];

function tableStars(stars: readonly Star[]): TableStars {
  const vectors = stars.flatMap(([, ra, dec, n = 1]) => {
    if (ra === undefined || dec === undefined) return [0, 0, 0];
    const cos = Math.cos(dec * radPerDeg);
    return [
      n * cos * Math.cos(ra * radPerDeg),
      n * cos * Math.sin(ra * radPerDeg),
      n * Math.sin(dec * radPerDeg),
    ];
  });
  return { keys: stars.map(([key]) => key), vectors: Float64Array.from(vectors) };
}
const merge = (...stars: readonly Star[]) => mergeStars(tableStars(stars));
const arcsec = 1 / 3600;

describe('stars of several tables', () => {
  it('are one when their names are, with or without a position', () => {
    expect([...merge(['a', 10, 20], ['b', 11, 20], ['a'], ['a', 10, 20]).star]).toEqual([0, 1, 0, 0]);
  });

  it('are two when one name lies at two places, such as a number of two fields', () => {
    const merged = merge(['12', 10, 20], ['12', 40, -5], ['12', 10, 20 + 9 * arcsec], ['12', 40, -5]);
    expect([...merged.star]).toEqual([0, 1, 0, 1]);
    expect(merged.nStars).toBe(2);
  });

  it('are found by position where one has no name, within 2″, across 0 h and at a pole', () => {
    const merged = merge(
      ['', 359.9999, 0],
      ['a', 0.0001, 0],
      ['', 0.0001 + 1.9 * arcsec, 0],
      ['', 0.0001 + 2.1 * arcsec, 0],
      ['', 10, 89.9999],
      ['', 190, 89.9999],
    );
    expect([...merged.star]).toEqual([0, 0, 0, 1, 2, 2]);
    expect([...merged.named]).toEqual([1, 3, 4]);
  });

  it('take the nearest of two', () => {
    const merged = merge(['a', 10, 0], ['b', 10, 3 * arcsec], ['', 10, 1.8 * arcsec]);
    expect([...merged.star]).toEqual([0, 1, 1]);
  });

  it('are named by the one with a name, wherever it stands, and keep the order of appearance', () => {
    const merged = merge(['', 10, 0], ['a', 10, 0], ['', 50, 0]);
    expect([...merged.star]).toEqual([0, 0, 1]);
    expect([...merged.named]).toEqual([1, 2]);
  });

  it('stand at the mean of all measurements', () => {
    const merged = merge(['a', 0.0002, 10, 3], ['a', 359.9998, 10.0004, 1], ['b']);
    expectWithin(merged.ra[0] ?? NaN, 0.0001, { absolute: 1e-9, unit: 'deg' });
    expectWithin(merged.dec[0] ?? NaN, 10.0001, { absolute: 1e-9, unit: 'deg' });
    expect(merged.ra[1]).toBeNaN();
  });

  it('are refused without vectors for each', () => {
    expect(() => mergeStars({ keys: ['a'], vectors: new Float64Array(2) })).toThrow(RangeError);
  });
});

describe('the name of a position', () => {
  it.each([
    [83.633212, 22.01446, 'J053431.97+220052.0'],
    [0, -0.5, 'J000000.00-003000.0'],
    [359.999999, 89.99999, 'J235959.99+895959.9'],
    [150, -30.0001, 'J100000.00-300000.3'],
    [-0.1, 0, 'J235936.00+000000.0'],
  ])('of %d, %d is %s', (ra, dec, name) => expect(nameOfPosition(ra, dec)).toBe(name));

  it('is refused where there is none', () => {
    expect(() => nameOfPosition(NaN, 0)).toThrow(RangeError);
    expect(() => nameOfPosition(0, 91)).toThrow(RangeError);
  });
});

describe('a flag of a table', () => {
  it.each([
    ['', false, false],
    ['Saturated', true, false],
    ['near edge; SAT', true, false],
    ['satellite trail', false, false],
    ['rejected/saturation', true, true],
    ['bad', false, true],
    ['not bad-looking', false, true],
    ['blend', false, false],
  ])('“%s”: saturated %s, left out %s', (text, isSaturated, isLeftOut) =>
    expect(readTableFlag(text)).toEqual({ isSaturated, isLeftOut }),
  );
});
