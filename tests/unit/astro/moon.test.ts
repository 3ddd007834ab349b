import { describe, expect, it } from 'vitest';
import { moonAltitude, moonDirection, moonLight, moonPlace, moonSeparation } from '@/lib/astro/moon';
import { separation } from '@/lib/astro/separation';
import { skyMoment } from '@/lib/astro/sky-moment';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf, skyCases, utcOf } from '@/tests/support/sky-oracle';

const tolerance = { absolute: 0.02, unit: 'deg' } as const;
const day = 86_400_000;

describe('the Moon', () => {
  it.each(skyCases)(
    'case $id: altitude, azimuth and distance from the target are those of the oracle',
    (sky) => {
      const moment = skyMoment(sky.place, utcOf(sky.utc));
      const moon = moonPlace(moment);
      expectWithin(moon.altitude, sky.moon_alt_deg, tolerance);
      const turned = ((moon.azimuth - sky.moon_az_deg + 540) % 360) - 180;
      expectWithin(turned * Math.cos((sky.moon_alt_deg * Math.PI) / 180), 0, tolerance);
      expectWithin(moonAltitude(moment), moon.altitude, { absolute: 1e-9, unit: 'deg' });
      const apart = moonSeparation(moment, sky.ra_icrs_deg, sky.dec_icrs_deg);
      expectWithin(apart, sky.moon_target_separation_deg, tolerance);
    },
  );

  it.each(skyCases)(
    'case $id: illuminated fraction within 0.5 % and elongation are those of the oracle',
    (sky) => {
      const light = moonLight(skyMoment(sky.place, utcOf(sky.utc)));
      expectWithin(light.illuminatedFraction, sky.moon_illuminated_fraction, { absolute: 0.005, unit: '' });
      expectWithin(light.elongation, sky.moon_elongation_deg, tolerance);
    },
  );

  it('waxes while more of it is lit every day, and wanes while less is', () => {
    const days = Array.from({ length: 60 }, (_, i) => Date.UTC(2026, 8, 1) + i * day);
    const lights = days.map((utc) => moonLight(skyMoment(siteOf('north'), utc)));
    const wrong = lights.filter((today, i) => {
      const tomorrow = lights[i + 1];
      // The day of new or full Moon turns within itself.
      if (tomorrow === undefined || today.isWaxing !== tomorrow.isWaxing) return false;
      return tomorrow.illuminatedFraction > today.illuminatedFraction !== today.isWaxing;
    });
    expect(wrong).toEqual([]);
  });

  it('turns from waxing to waning once a month, at its fullest', () => {
    const hours = Array.from({ length: 30 * 24 }, (_, i) => Date.UTC(2026, 8, 1) + i * 3_600_000);
    const lights = hours.map((utc) => moonLight(skyMoment(siteOf('north'), utc)));
    const turns = lights.filter((light, i) => light.isWaxing === false && lights[i - 1]?.isWaxing === true);
    expect(turns).toHaveLength(1);
    expect(turns[0]?.illuminatedFraction).toBeGreaterThan(0.99);
  });

  it('is seen from the site, not from the Earth’s centre: two sites see it up to 2° apart', () => {
    const utc = Date.UTC(2026, 10, 3, 6);
    const north = moonPlace(skyMoment(siteOf('high69'), utc));
    const south = moonPlace(skyMoment(siteOf('south'), utc));
    expect(separation(north, south)).toBeGreaterThan(0.8);
    expect(separation(north, south)).toBeLessThan(2);
  });

  it('has a disc of 14.6 to 17 arcmin and a distance of 350 to 412 thousand km', () => {
    for (let i = 0; i < 30; i += 1) {
      const moon = moonPlace(skyMoment(siteOf('south'), Date.UTC(2026, 8, 1) + i * day));
      expectWithin(moon.semidiameter * 60, 15.8, { absolute: 1.2, unit: 'arcmin' });
      // 15.54 arcmin at the mean distance of 384,400 km.
      const atMeanDistance = (moon.semidiameter * 60 * moon.distance_km) / 384_400;
      expectWithin(atMeanDistance, 15.54, { absolute: 0.01, unit: 'arcmin' });
      expectWithin(moon.distance_km, 381_000, { absolute: 31_000, unit: 'km' });
    }
  });

  it('is no distance from itself', () => {
    const moment = skyMoment(siteOf('north'), Date.UTC(2026, 10, 3, 6));
    const { x, y, z } = moonDirection(moment);
    const ra = (Math.atan2(y, x) * 180) / Math.PI;
    const dec = (Math.atan2(z, Math.hypot(x, y)) * 180) / Math.PI;
    // A star there is moved by aberration, the Moon is not.
    expectWithin(moonSeparation(moment, ra, dec), 0, { absolute: 20.8 / 3600, unit: 'deg' });
  });

  it('a star without a place is refused', () => {
    const moment = skyMoment(siteOf('north'), Date.UTC(2026, 10, 3, 6));
    expect(() => moonSeparation(moment, NaN, 0)).toThrow(/Right ascension/);
    expect(() => moonSeparation(moment, 0, -90.5)).toThrow(/Declination/);
  });
});
