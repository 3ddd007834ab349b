import { describe, expect, it } from 'vitest';
import { placeAfter, yearsSinceJ2000 } from '@/lib/astro/proper-motion';
import { expectWithin } from '@/tests/support/numbers';

describe('placeAfter', () => {
  it('moves a star near the pole along its great circle, not along its right ascension', () => {
    const moved = placeAfter({ ra: 0, dec: 89.9999 }, { pmRa: 0, pmDec: 36_000 }, 20);
    expectWithin(moved.ra, 180, { absolute: 1e-6, unit: 'deg' });
    expectWithin(moved.dec, 90 - 0.2 + 0.0001, { absolute: 1e-6, unit: 'deg' });
  });

  it('takes the motion in right ascension as already multiplied by cos dec', () => {
    const moved = placeAfter({ ra: 359.9999, dec: 60 }, { pmRa: 300, pmDec: -400 }, 26.5);
    expectWithin(moved.ra, 359.9999 + (0.3 * 26.5) / 3600 / 0.5 - 360, { absolute: 1e-6, unit: 'deg' });
    expectWithin(moved.dec, 60 - (0.4 * 26.5) / 3600, { absolute: 1e-6, unit: 'deg' });
  });

  it('leaves a star without a published proper motion where it is', () => {
    expect(placeAfter({ ra: 10, dec: 20 }, { pmRa: NaN, pmDec: NaN }, 50)).toEqual({ ra: 10, dec: 20 });
  });
});

describe('yearsSinceJ2000', () => {
  it('counts Julian years from noon of the first day of 2000', () => {
    expect(yearsSinceJ2000(Date.UTC(2000, 0, 1, 12))).toBe(0);
    expectWithin(yearsSinceJ2000(Date.UTC(2100, 0, 1, 12)), 100, { absolute: 1e-9, unit: 'yr' });
  });
});
