import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  formatDeclination,
  formatHourAngle,
  formatHours,
  formatRightAscension,
} from '@/lib/astro/format-sexagesimal';

const seed = 20261110;
const secondOfRa = 15 / 3600;

describe('writing positions', () => {
  it.each([
    [188.73625, 2, '12:34:56.70'],
    [0, 0, '00:00:00'],
    [-15, 0, '23:00:00'],
    [360, 1, '00:00:00.0'],
    [59.9996 * secondOfRa, 4, '00:00:59.9996'],
  ])('right ascension %d° with %d decimals is %s', (ra, decimals, text) => {
    expect(formatRightAscension(ra, decimals)).toBe(text);
  });

  it.each([
    ['seconds into minutes', 59.9996 * secondOfRa, '00:01:00.00'],
    ['minutes into hours', (3599.9996 * 15) / 3600, '01:00:00.00'],
    ['24 hours into 0', 360 - 0.0004 * secondOfRa, '00:00:00.00'],
  ])('right ascension carries %s instead of printing 60', (_, ra, text) => {
    expect(formatRightAscension(ra)).toBe(text);
  });

  it.each([
    [-12.582416666666667, 1, '-12:34:56.7'],
    [12.582416666666667, 1, '+12:34:56.7'],
    [-12 / 3600, 0, '-00:00:12'],
    [0, 0, '+00:00:00'],
    [-0, 0, '+00:00:00'],
    [-0.01 / 3600, 1, '+00:00:00.0'],
    [89.99999999, 1, '+90:00:00.0'],
    [-90, 2, '-90:00:00.00'],
    [5 + 59.96 / 3600, 1, '+05:01:00.0'],
    [5 + 3599.96 / 3600, 1, '+06:00:00.0'],
  ])('declination %d° with %d decimals is %s', (dec, decimals, text) => {
    expect(formatDeclination(dec, decimals)).toBe(text);
  });

  it.each([
    [1.79062721, 0, '01:47:26'],
    [23.99999, 0, '00:00:00'],
    [-1, 0, '23:00:00'],
    [12.5, 1, '12:30:00.0'],
  ])('the clock at %d h with %d decimals shows %s', (hours, decimals, text) => {
    expect(formatHours(hours, decimals)).toBe(text);
  });

  it.each([
    [-5.09195918, 0, '-05:05:31'],
    [0.6366033, 0, '+00:38:12'],
    [-0.0001, 0, '+00:00:00'],
    [12, 0, '+12:00:00'],
    [-11.99999, 0, '-12:00:00'],
  ])('hour angle %d h with %d decimals is %s', (hours, decimals, text) => {
    expect(formatHourAngle(hours, decimals)).toBe(text);
  });

  it('no position is ever written with 60 minutes or 60 seconds', () => {
    const decimals = fc.integer({ min: 0, max: 6 });
    fc.assert(
      fc.property(fc.double({ min: -90, max: 90, noNaN: true }), decimals, (angle, digits) => {
        for (const text of [formatDeclination(angle, digits), formatRightAscension(angle, digits)]) {
          expect(text).toMatch(/^[-+]?\d\d:[0-5]\d:[0-5]\d(\.\d+)?$/);
        }
      }),
      { seed },
    );
  });
});

describe('what cannot be written is refused', () => {
  it.each([-1, 7, 1.5, NaN])('%d decimals', (decimals) => {
    expect(() => formatRightAscension(0, decimals)).toThrow(/decimals/);
    expect(() => formatDeclination(0, decimals)).toThrow(/decimals/);
    expect(() => formatHours(0, decimals)).toThrow(/decimals/);
    expect(() => formatHourAngle(0, decimals)).toThrow(/decimals/);
  });

  it('angles that are not finite, a declination beyond the pole, an hour angle beyond half a turn', () => {
    expect(() => formatRightAscension(NaN)).toThrow(RangeError);
    expect(() => formatHours(Infinity)).toThrow(RangeError);
    expect(() => formatDeclination(90.1)).toThrow(/Declination/);
    expect(() => formatHourAngle(12.5)).toThrow(/Hour angle/);
  });
});
