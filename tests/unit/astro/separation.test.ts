import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { positionAngle, separation } from '@/lib/astro/separation';
import { expectWithin } from '@/tests/support/numbers';

const seed = 20261108;
const arcsec = 1 / 3600;
const exact = { absolute: 1e-12, unit: 'deg' } as const;
const place = fc.record({
  ra: fc.double({ min: 0, max: 360, noNaN: true }),
  dec: fc.double({ min: -90, max: 90, noNaN: true }),
});

describe('the angle between two places', () => {
  it('of Arcturus and Spica is 32.7930° (Meeus 1998, example 17.a)', () => {
    const apart = separation({ ra: 213.9154, dec: 19.1825 }, { ra: 201.2983, dec: -11.1614 });
    expectWithin(apart, 32.793, { absolute: 5e-5, unit: 'deg' });
  });

  it('keeps its digits for a milliarcsecond, anywhere', () => {
    for (const dec of [0, 45, 89.9, -89.99]) {
      expectWithin(separation({ ra: 10, dec }, { ra: 10, dec: dec + 1e-3 * arcsec }), 1e-3 * arcsec, {
        absolute: 1e-7 * arcsec,
        unit: 'deg',
      });
    }
  });

  it('is small across right ascension 0', () => {
    expectWithin(separation({ ra: 359.9999, dec: 0 }, { ra: 0.0001, dec: 0 }), 0.0002, exact);
    expectWithin(separation({ ra: -0.0001, dec: 0 }, { ra: 360.0001, dec: 0 }), 0.0002, exact);
  });

  it('forgets right ascension at a pole', () => {
    expectWithin(separation({ ra: 12, dec: 90 }, { ra: 250, dec: 90 }), 0, exact);
    expectWithin(separation({ ra: 12, dec: 89.5 }, { ra: 192, dec: 89.5 }), 1, exact);
    expectWithin(separation({ ra: 77, dec: -90 }, { ra: 3, dec: 90 }), 180, exact);
  });

  it('of opposite places is 180°, to the last arcsecond', () => {
    expectWithin(separation({ ra: 40, dec: 30 }, { ra: 220, dec: -30 }), 180, {
      absolute: 1e-9,
      unit: 'deg',
    });
    expectWithin(separation({ ra: 0, dec: 0 }, { ra: 180, dec: arcsec }), 180 - arcsec, {
      absolute: 1e-9,
      unit: 'deg',
    });
  });

  it('is the same both ways, nothing to itself, and obeys the triangle', () => {
    fc.assert(
      fc.property(place, place, place, (a, b, c) => {
        expectWithin(separation(a, b), separation(b, a), { absolute: 1e-10, unit: 'deg' });
        expectWithin(separation(a, a), 0, exact);
        expect(separation(a, c)).toBeLessThanOrEqual(separation(a, b) + separation(b, c) + 1e-9);
      }),
      { seed },
    );
  });

  it('does not care where right ascension is counted from', () => {
    fc.assert(
      fc.property(place, place, fc.double({ min: -720, max: 720, noNaN: true }), (a, b, shift) => {
        const turned = separation({ ...a, ra: a.ra + shift }, { ...b, ra: b.ra + shift });
        expectWithin(turned, separation(a, b), { absolute: 1e-9, unit: 'deg' });
      }),
      { seed },
    );
  });
});

describe('the position angle', () => {
  it.each([
    ['north', { ra: 10, dec: 1 }, 0],
    ['east', { ra: 11, dec: 0 }, 90],
    ['south', { ra: 10, dec: -1 }, 180],
    ['west', { ra: 9, dec: 0 }, 270],
    ['itself', { ra: 10, dec: 0 }, 0],
  ])('to the %s', (_, to, expected) => {
    expectWithin(positionAngle({ ra: 10, dec: 0 }, to), expected, exact);
  });

  it('to the east across right ascension 0 is 90°', () => {
    expectWithin(positionAngle({ ra: 359.99, dec: 0 }, { ra: 0.01, dec: 0 }), 90, exact);
  });

  it('from anywhere to the north pole is 0', () => {
    fc.assert(
      fc.property(place, (from) => {
        fc.pre(Math.abs(from.dec) < 89.999);
        const angle = positionAngle(from, { ra: 200, dec: 90 });
        expectWithin(((angle + 180) % 360) - 180, 0, { absolute: 1e-6, unit: 'deg' });
      }),
      { seed },
    );
  });
});

describe('places that are not on the sky are refused', () => {
  it.each([
    [{ ra: NaN, dec: 0 }, /Right ascension/],
    [{ ra: Infinity, dec: 0 }, /Right ascension/],
    [{ ra: 0, dec: 90.0001 }, /Declination/],
    [{ ra: 0, dec: NaN }, /Declination/],
  ])('%j', (bad, message) => {
    const good = { ra: 0, dec: 0 };
    for (const measure of [separation, positionAngle]) {
      expect(() => measure(bad, good)).toThrow(message);
      expect(() => measure(good, bad)).toThrow(message);
    }
  });
});
