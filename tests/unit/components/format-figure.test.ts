import { describe, expect, it } from 'vitest';
import {
  decimalsSupported,
  figureParts,
  formatBytes,
  formatCount,
  formatFixed,
  formatPlain,
  formatSigned,
  formatWithError,
  noValue,
} from '@/lib/contracts/format-figure';

describe('a figure', () => {
  it.each([
    [-0.0409, 4, '−0.0409'],
    [3.1042, 4, '3.1042'],
    [-0.0004, 3, '0.000'],
    [0, 2, '0.00'],
    [-0, 1, '0.0'],
    [1234.5, -1, '1230'],
    [null, 2, noValue],
    [Number.NaN, 2, noValue],
    [Number.POSITIVE_INFINITY, 2, noValue],
  ])(
    '%s with %s decimals is written %s, with a true minus sign and no negative zero',
    (value, decimals, text) => {
      expect(formatFixed(value, decimals)).toBe(text);
    },
  );

  it.each([
    [0.018, 3, '+0.018'],
    [-0.3, 1, '−0.3'],
    [0.0001, 2, '0.00'],
  ])('%s as a difference shows its sign unless it is nothing', (value, decimals, text) => {
    expect(formatSigned(value, decimals)).toBe(text);
  });

  it.each([
    [12.3454, 0.0123, '12.345 ± 0.012'],
    [3.10417, 0.0061, '3.1042 ± 0.0061'],
    [-0.04092, 0.00218, '−0.0409 ± 0.0022'],
    [20, 0.0996, '20.00 ± 0.10'],
    [1234, 118, '1230 ± 120'],
    [5.5, 1, '5.5 ± 1.0'],
  ])('%s with the error %s shows two digits of the error and no more', (value, error, text) => {
    expect(formatWithError(value, error)).toBe(text);
  });

  it('without an error shows the decimals asked for and no uncertainty', () => {
    expect(figureParts(12.3456, null)).toEqual({ value: '12.346', error: null });
    expect(figureParts(12.3456, 0, 1)).toEqual({ value: '12.3', error: null });
    expect(figureParts(undefined, 0.1)).toEqual({ value: noValue, error: null });
  });

  it('never supports more digits for a larger error', () => {
    let last = Number.POSITIVE_INFINITY;
    for (let error = 1e-6; error < 1e4; error *= 1.07) {
      const decimals = decimalsSupported(error);
      expect(decimals, `at ${error}`).toBeLessThanOrEqual(last);
      last = decimals;
    }
  });

  it.each([
    [1184, '1,184'],
    [999, '999'],
    [2_000_000, '2,000,000'],
    [-1500, '−1,500'],
  ])('as a count sets thousands apart: %s is %s', (value, text) => {
    expect(formatCount(value)).toBe(text);
  });

  it.each([
    [40, '40'],
    [0.5, '0.5'],
    [0.1 + 0.2, '0.3'],
    [-17.25, '−17.25'],
  ])('as it stands has no noise of binary fractions: %s is %s', (value, text) => {
    expect(formatPlain(value)).toBe(text);
  });

  it.each([
    [0, '0 B'],
    [999, '999 B'],
    [1000, '1.0 kB'],
    [999_950, '1.0 MB'],
    [209_715_200, '210 MB'],
  ])('as a size is short: %s is %s', (value, text) => {
    expect(formatBytes(value)).toBe(text);
  });
});
