import { describe, expect, it } from 'vitest';
import { skyMoment } from '@/lib/astro/sky-moment';
import { sunAltitude, sunPlace } from '@/lib/astro/sun';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf, skyCases, utcOf } from '@/tests/support/sky-oracle';

const tolerance = { absolute: 0.02, unit: 'deg' } as const;

describe('the Sun', () => {
  it.each(skyCases)('case $id: altitude and azimuth are those of the oracle', (sky) => {
    const moment = skyMoment(sky.place, utcOf(sky.utc));
    const sun = sunPlace(moment);
    expectWithin(sun.altitude, sky.sun_alt_deg, tolerance);
    const turned = ((sun.azimuth - sky.sun_az_deg + 540) % 360) - 180;
    expectWithin(turned * Math.cos((sky.sun_alt_deg * Math.PI) / 180), 0, tolerance);
    expectWithin(sunAltitude(moment), sun.altitude, { absolute: 1e-9, unit: 'deg' });
  });

  it('stands on the equator at the equinox of March 2026 (20 March, 14:46 UTC)', () => {
    const sun = sunPlace(skyMoment(siteOf('north'), Date.UTC(2026, 2, 20, 14, 46)));
    // Topocentric: the parallax of 8.8 arcsec is within the tolerance.
    expectWithin(sun.dec, 0, { absolute: 0.005, unit: 'deg' });
    expectWithin(((sun.ra + 180) % 360) - 180, 0, { absolute: 0.005, unit: 'deg' });
  });

  it('is nearest in early January and farthest in early July', () => {
    const distance = (month: number, day: number) =>
      sunPlace(skyMoment(siteOf('north'), Date.UTC(2026, month, day))).distance_au;
    expectWithin(distance(0, 3), 0.9833, { absolute: 0.0002, unit: 'au' });
    expectWithin(distance(6, 6), 1.0167, { absolute: 0.0002, unit: 'au' });
  });

  it('keeps every figure finite', () => {
    expect(
      Object.values(sunPlace(skyMoment(siteOf('high69'), Date.UTC(2025, 5, 21)))).every(Number.isFinite),
    ).toBe(true);
  });
});
