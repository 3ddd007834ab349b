import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { apparentDirection, apparentPlace } from '@/lib/astro/apparent-place';
import {
  altitudeOf,
  horizontalFromHourAngle,
  horizontalPlace,
  horizontalPlaceOf,
} from '@/lib/astro/horizontal-place';
import { separation } from '@/lib/astro/separation';
import type { Site } from '@/lib/astro/site';
import { skyMoment } from '@/lib/astro/sky-moment';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf, skyCases, utcOf } from '@/tests/support/sky-oracle';

const seed = 20261103;
/** What photometry needs; ours are ten times tighter below. */
const asked = { absolute: 0.01, unit: 'deg' } as const;
const ours = { absolute: 0.001, unit: 'deg' } as const;

const latitudes = fc.double({ min: -90, max: 90, noNaN: true });
const declinations = fc.double({ min: -90, max: 90, noNaN: true });
const hourAngles = fc.double({ min: -11.999, max: 12, noNaN: true });

describe('the place of a star over the horizon', () => {
  it.each(skyCases)('case $id ($target): altitude, azimuth and angles are those of the oracle', (sky) => {
    const moment = skyMoment(sky.place, utcOf(sky.utc));
    const place = horizontalPlace(moment, sky.ra_icrs_deg, sky.dec_icrs_deg);
    const cosAltitude = Math.cos((sky.alt_deg * Math.PI) / 180);
    expectWithin(place.altitude, sky.alt_deg, ours);
    expectWithin(place.zenithDistance, 90 - sky.alt_deg, ours);
    expectWithin(turn(place.azimuth - sky.az_deg) * cosAltitude, 0, ours);
    expectWithin(turn(15 * (place.hourAngle_hours - sky.hour_angle_h)), 0, ours);
    expectWithin(turn(place.parallacticAngle - sky.parallactic_angle_deg), 0, {
      absolute: 0.002,
      unit: 'deg',
    });
    const { dec } = apparentPlace(moment, sky.ra_icrs_deg, sky.dec_icrs_deg);
    expectWithin(dec, sky.dec_apparent_topo_deg, { absolute: 0.0002, unit: 'deg' });
  });

  it('leaving precession out would show: J2000 circles set on the sky of 2026 miss by more than 0.2°', () => {
    const misses = skyCases.map((sky) => {
      const hourAngle_hours = sky.last_h - sky.ra_icrs_deg / 15;
      const careless = horizontalFromHourAngle(hourAngle_hours, sky.dec_icrs_deg, sky.place.latitude);
      return Math.abs(careless.altitude - sky.alt_deg);
    });
    expect(Math.max(...misses)).toBeGreaterThan(0.2);
    expect(Math.max(...misses)).toBeGreaterThan(10 * asked.absolute);
  });

  it('hour angle is zero on the meridian, and then altitude is 90 − |latitude − declination|', () => {
    const place = horizontalFromHourAngle(0, -10, 28.31);
    expectWithin(place.altitude, 90 - 38.31, { absolute: 1e-12, unit: 'deg' });
    expectWithin(place.azimuth, 180, { absolute: 1e-12, unit: 'deg' });
    expectWithin(place.parallacticAngle, 0, { absolute: 1e-12, unit: 'deg' });
  });

  it('a star at the zenith has altitude 90 and loses no digits there', () => {
    expectWithin(horizontalFromHourAngle(0, 28.31, 28.31).altitude, 90, { absolute: 1e-12, unit: 'deg' });
    expectWithin(horizontalFromHourAngle(0, 28.31 + 1e-7, 28.31).zenithDistance, 1e-7, {
      absolute: 1e-11,
      unit: 'deg',
    });
  });

  it('the celestial pole stands at the altitude of the latitude at every hour', () => {
    fc.assert(
      fc.property(hourAngles, latitudes, (hours, latitude) => {
        expectWithin(horizontalFromHourAngle(hours, 90, latitude).altitude, latitude, {
          absolute: 1e-9,
          unit: 'deg',
        });
      }),
      { seed },
    );
  });

  it('at the pole of the Earth altitude is declination at every hour', () => {
    fc.assert(
      fc.property(hourAngles, declinations, (hours, dec) => {
        expectWithin(horizontalFromHourAngle(hours, dec, 90).altitude, dec, { absolute: 1e-9, unit: 'deg' });
        expectWithin(horizontalFromHourAngle(hours, dec, -90).altitude, -dec, {
          absolute: 1e-9,
          unit: 'deg',
        });
      }),
      { seed },
    );
  });

  it('east and west of the meridian mirror each other', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 11.9, noNaN: true }),
        declinations,
        latitudes,
        (hours, dec, latitude) => {
          const [west, east] = [hours, -hours].map((h) => horizontalFromHourAngle(h, dec, latitude));
          expectWithin(west?.altitude ?? NaN, east?.altitude ?? NaN, { absolute: 1e-9, unit: 'deg' });
          expectWithin(west?.parallacticAngle ?? NaN, -(east?.parallacticAngle ?? NaN), {
            absolute: 1e-9,
            unit: 'deg',
          });
        },
      ),
      { seed },
    );
  });

  it('both hemispheres mirror each other', () => {
    fc.assert(
      fc.property(hourAngles, declinations, latitudes, (hours, dec, latitude) => {
        const north = horizontalFromHourAngle(hours, dec, latitude);
        const south = horizontalFromHourAngle(hours, -dec, -latitude);
        expectWithin(north.altitude, south.altitude, { absolute: 1e-9, unit: 'deg' });
      }),
      { seed },
    );
  });

  it('the short way to the altitude, for columns, gives the same as the whole place', () => {
    const moment = skyMoment(siteOf('south'), Date.UTC(2026, 3, 12, 3));
    fc.assert(
      fc.property(fc.double({ min: 0, max: 360, noNaN: true }), declinations, (ra, dec) => {
        const direction = apparentDirection(moment, ra, dec);
        expectWithin(altitudeOf(moment, direction), horizontalPlaceOf(moment, direction).altitude, {
          absolute: 1e-9,
          unit: 'deg',
        });
      }),
      { seed },
    );
  });

  it('right ascension −1, 359 and 719 are the same star', () => {
    const moment = skyMoment(siteOf('north'), Date.UTC(2026, 10, 3));
    const altitudes = [-1, 359, 719].map((ra) => horizontalPlace(moment, ra, 10).altitude);
    expectWithin(altitudes[1] ?? NaN, altitudes[0] ?? NaN, { absolute: 1e-9, unit: 'deg' });
    expectWithin(altitudes[2] ?? NaN, altitudes[0] ?? NaN, { absolute: 1e-9, unit: 'deg' });
  });
});

describe('the apparent place', () => {
  it('stands 0.36° from J2000 by 2026 on the ecliptic, by precession', () => {
    const moment = skyMoment(siteOf('north'), Date.UTC(2026, 10, 3));
    const moved = separation({ ra: 0, dec: 0 }, apparentPlace(moment, 0, 0));
    expectWithin(moved, 0.376, { absolute: 0.01, unit: 'deg' });
  });

  it('is tipped forward by aberration of some 20.5 arcsec, and by nothing where the Earth is heading', () => {
    const moment = skyMoment(siteOf('north'), Date.UTC(2026, 10, 3));
    const { x, y, z } = moment.velocity_c;
    const speed = Math.hypot(x, y, z);
    expectWithin(speed, 1e-4, { absolute: 0.03e-4, unit: 'c' });
    const heading = {
      ra: (Math.atan2(y, x) * 180) / Math.PI,
      dec: (Math.asin(z / speed) * 180) / Math.PI,
    };
    const still = { ...moment, velocity_c: { x: 0, y: 0, z: 0 } };
    const shift_arcsec = (ra: number, dec: number) =>
      3600 * separation(apparentPlace(still, ra, dec), apparentPlace(moment, ra, dec));
    expectWithin(shift_arcsec(heading.ra, heading.dec), 0, { absolute: 1e-6, unit: 'arcsec' });
    const sideways = shift_arcsec(heading.ra, heading.dec > 0 ? heading.dec - 90 : heading.dec + 90);
    expectWithin(sideways, 20.5, { absolute: 0.7, unit: 'arcsec' });
  });

  it('exists at both poles of J2000', () => {
    const moment = skyMoment(siteOf('north'), Date.UTC(2026, 10, 3));
    expectWithin(apparentPlace(moment, 0, 90).dec, 89.85, { absolute: 0.02, unit: 'deg' });
    expectWithin(apparentPlace(moment, 123, -90).dec, -89.85, { absolute: 0.02, unit: 'deg' });
  });
});

describe('what cannot be is refused', () => {
  const moment = skyMoment(siteOf('north'), Date.UTC(2026, 10, 3));

  it.each([NaN, Infinity, 90.001, -91])('declination %d', (dec) => {
    expect(() => horizontalPlace(moment, 0, dec)).toThrow(/Declination/);
    expect(() => horizontalFromHourAngle(0, dec, 0)).toThrow(/Declination/);
  });

  it.each([NaN, Infinity])('right ascension %d', (ra) => {
    expect(() => horizontalPlace(moment, ra, 0)).toThrow(/Right ascension/);
  });

  it('a latitude beyond a pole', () => {
    expect(() => horizontalFromHourAngle(0, 0, 90.5)).toThrow(/Latitude/);
  });

  it.each<[keyof Site, number]>([
    ['longitude', 400],
    ['longitude', NaN],
    ['latitude', -90.1],
    ['latitude', NaN],
    ['elevation', 12_000],
    ['elevation', -1000],
    ['elevation', NaN],
  ])('a site with %s %d', (name, value) => {
    expect(() => skyMoment({ ...siteOf('north'), [name]: value }, 0)).toThrow(RangeError);
  });

  it('an instant that is not one', () => {
    expect(() => skyMoment(siteOf('north'), NaN)).toThrow(/instant/);
  });
});

/** An angle's difference, the short way round. */
function turn(degrees: number): number {
  return ((degrees + 540) % 360) - 180;
}
