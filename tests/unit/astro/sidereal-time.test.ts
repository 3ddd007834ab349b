import { describe, expect, it } from 'vitest';
import { gast_hours, gmst_hours, last_hours, lmst_hours } from '@/lib/astro/sidereal-time';
import { skyMoment } from '@/lib/astro/sky-moment';
import { expectWithin } from '@/tests/support/numbers';
import { skyCases, utcOf } from '@/tests/support/sky-oracle';

/** Ours, far below the 0.01° that is asked. 0.02 s = 0.00008°. */
const tolerance = { absolute: 0.02 / 3600, unit: 'h' } as const;

describe('sidereal time', () => {
  it.each(skyCases)('case $id: Greenwich and local, mean and apparent, are those of the oracle', (sky) => {
    const utc = utcOf(sky.utc);
    expectWithin(gmst_hours(utc), sky.gmst_h, { absolute: 0.001 / 3600, unit: 'h' });
    expectWithin(gast_hours(utc), sky.gast_h, tolerance);
    expectWithin(lmst_hours(utc, sky.place.longitude), sky.lmst_h, tolerance);
    expectWithin(last_hours(utc, sky.place.longitude), sky.last_h, tolerance);
    expectWithin(skyMoment(sky.place, utc).last_hours, sky.last_h, tolerance);
  });

  it('gains one turn on the Sun in a year', () => {
    const start = Date.UTC(2025, 0, 1);
    const daily_s = (gmst_hours(start + 86_400_000) - gmst_hours(start)) * 3600;
    expectWithin(daily_s, 236.555, { absolute: 0.001, unit: 's' });
  });

  it('a longitude counted east to 360° is the same place as one counted west from 0', () => {
    const utc = Date.UTC(2026, 10, 3);
    expectWithin(last_hours(utc, 342.75), last_hours(utc, -17.25), { absolute: 1e-12, unit: 'h' });
  });

  it.each([NaN, Infinity, -181, 361])('longitude %d is refused', (longitude) => {
    expect(() => lmst_hours(0, longitude)).toThrow(/Longitude/);
    expect(() => last_hours(0, longitude)).toThrow(/Longitude/);
  });

  it('an instant that is not one is refused', () => {
    expect(() => gmst_hours(NaN)).toThrow(RangeError);
    expect(() => gast_hours(Infinity)).toThrow(RangeError);
  });
});
