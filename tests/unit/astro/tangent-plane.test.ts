import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { separation } from '@/lib/astro/separation';
import { meanPlace, tangentOffset } from '@/lib/astro/tangent-plane';
import { expectWithin } from '@/tests/support/numbers';

const tight = { absolute: 1e-9, unit: 'deg' };
const place = fc.record({
  ra: fc.double({ min: 0, max: 359.999, noNaN: true }),
  dec: fc.double({ min: -89.9, max: 89.9, noNaN: true }),
});

describe('the tangent plane', () => {
  it('east is towards larger right ascension, north towards the pole, across right ascension 0 too', () => {
    const { east, north } = tangentOffset({ ra: 359.95, dec: 0 }, { ra: 0.05, dec: 0 });
    expectWithin(east, 0.1, { absolute: 1e-6, unit: 'deg' });
    expectWithin(north, 0, tight);
    const up = tangentOffset({ ra: 10, dec: 89.9 }, { ra: 190, dec: 89.9 });
    expectWithin(up.north, 0.2, { absolute: 1e-6, unit: 'deg' });
    expectWithin(up.east, 0, tight);
  });

  it('the distance from the centre on the plane is the tangent of that on the sphere', () => {
    fc.assert(
      fc.property(place, place, (centre, other) => {
        const distance = separation(centre, other);
        fc.pre(distance < 60);
        const { east, north } = tangentOffset(centre, other);
        const rad = Math.PI / 180;
        expectWithin(Math.hypot(east, north) * rad, Math.tan(distance * rad), {
          absolute: 1e-9,
          unit: 'rad',
        });
      }),
      { seed: 41 },
    );
  });

  it('a place a quarter of the sky away or more is refused', () => {
    expect(() => tangentOffset({ ra: 0, dec: 0 }, { ra: 90, dec: 0 })).toThrow(RangeError);
    expect(() => tangentOffset({ ra: 0, dec: 0 }, { ra: 180, dec: 10 })).toThrow(RangeError);
  });

  it('the middle of places around right ascension 0 and around a pole lies among them', () => {
    const middle = meanPlace([
      { ra: 359.5, dec: 2 },
      { ra: 0.5, dec: 2 },
    ]);
    expectWithin(separation(middle, { ra: 0, dec: 2 }), 0, { absolute: 1e-4, unit: 'deg' });
    const polar = meanPlace([0, 120, 240].map((ra) => ({ ra, dec: -88 })));
    expectWithin(polar.dec, -90, tight);
  });

  it('opposite places, or none, have no middle', () => {
    expect(() => meanPlace([])).toThrow(RangeError);
    expect(() =>
      meanPlace([
        { ra: 0, dec: 0 },
        { ra: 180, dec: 0 },
      ]),
    ).toThrow(RangeError);
  });
});
