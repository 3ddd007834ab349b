import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { normaliseHours, normaliseRightAscension, wrapHourAngle } from '@/lib/astro/angles';
import { expectWithin } from '@/tests/support/numbers';

const seed = 20261101;
const anyAngle = fc.double({ min: -1e6, max: 1e6, noNaN: true });

describe('angles on the circle', () => {
  it.each([
    [0, 0],
    [360, 0],
    [-0, 0],
    [-1, 359],
    [725, 5],
    [-1e-20, 0],
  ])('right ascension %d° is %d°', (ra, expected) => {
    expect(normaliseRightAscension(ra)).toBe(expected);
  });

  it('every right ascension lands in one turn and keeps its direction', () => {
    fc.assert(
      fc.property(anyAngle, (ra) => {
        const turned = normaliseRightAscension(ra);
        expect(turned >= 0 && turned < 360).toBe(true);
        expectWithin(Math.cos((turned * Math.PI) / 180), Math.cos((ra * Math.PI) / 180), {
          absolute: 1e-9,
          unit: '',
        });
      }),
      { seed },
    );
  });

  it('every hour angle lands within half a turn, the lower meridian counting as west', () => {
    expect(wrapHourAngle(12)).toBe(12);
    expect(wrapHourAngle(-12)).toBe(12);
    expect(wrapHourAngle(13)).toBe(-11);
    fc.assert(
      fc.property(anyAngle, (hours) => {
        const wrapped = wrapHourAngle(hours);
        expect(wrapped > -12 && wrapped <= 12).toBe(true);
        expectWithin(normaliseHours(wrapped), normaliseHours(hours), { absolute: 1e-9, unit: 'h' });
      }),
      { seed },
    );
  });

  it.each([NaN, Infinity, -Infinity])('%d is refused as an angle', (value) => {
    expect(() => normaliseRightAscension(value)).toThrow(RangeError);
    expect(() => normaliseHours(value)).toThrow(RangeError);
    expect(() => wrapHourAngle(value)).toThrow(RangeError);
  });
});
