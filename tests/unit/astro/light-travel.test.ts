import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lightTravel, starTimeColumns, starTimes } from '@/lib/astro/light-travel';
import { skyMoment } from '@/lib/astro/sky-moment';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf, skyCases, utcOf } from '@/tests/support/sky-oracle';

const seed = 20261105;
const second = 1 / 86_400;

describe('heliocentric and barycentric times', () => {
  it.each(skyCases)('case $id: HJD within 1 s and BJD within 0.5 s of the oracle', (sky) => {
    const moment = skyMoment(sky.place, utcOf(sky.utc));
    const times = starTimes(moment, sky.ra_icrs_deg, sky.dec_icrs_deg);
    expectWithin(times.hjdUtc, Number(sky.hjd_utc), { absolute: second, unit: 'd' });
    // The oracle has it on TDB, which stays within 2 ms of TT.
    expectWithin(times.hjdTt, Number(sky.hjd_tdb), { absolute: second, unit: 'd' });
    expectWithin(times.bjdTdb, Number(sky.bjd_tdb), { absolute: 0.5 * second, unit: 'd' });
    expectWithin(times.jdUtc, Number(sky.jd_utc), { absolute: 1.1e-9, unit: 'd' });
  });

  it.each(skyCases)('case $id: the light times themselves hold to 0.02 s', (sky) => {
    const moment = skyMoment(sky.place, utcOf(sky.utc));
    const light = lightTravel(moment, sky.ra_icrs_deg, sky.dec_icrs_deg);
    expectWithin(light.heliocentric_s, sky.heliocentric_ltt_s, { absolute: 0.02, unit: 's' });
    expectWithin(light.barycentric_s, sky.barycentric_ltt_s, { absolute: 0.02, unit: 's' });
  });

  it('opposite directions have opposite light times, none above 510 s', () => {
    const moment = skyMoment(siteOf('north'), Date.UTC(2026, 10, 3));
    fc.assert(
      fc.property(anyRa, anyDec, (ra, dec) => {
        const there = lightTravel(moment, ra, dec);
        const opposite = lightTravel(moment, ra + 180, -dec);
        expectWithin(there.barycentric_s, -opposite.barycentric_s, { absolute: 1e-9, unit: 's' });
        expect(Math.abs(there.heliocentric_s)).toBeLessThan(510);
      }),
      { seed },
    );
  });

  it('a whole column gives, row by row, what one star at a time gives', () => {
    const moment = skyMoment(siteOf('south'), Date.UTC(2025, 5, 5, 4));
    const ra = Float64Array.from({ length: 50 }, (_, i) => i * 7.3 - 3);
    const dec = Float64Array.from({ length: 50 }, (_, i) => 90 - i * 3.6);
    const columns = starTimeColumns(moment, ra, dec);
    for (const [i, ra_deg] of ra.entries()) {
      const one = starTimes(moment, ra_deg, dec[i] ?? NaN);
      expect(columns.hjdUtc[i]).toBe(one.hjdUtc);
      expect(columns.hjdTt[i]).toBe(one.hjdTt);
      expect(columns.bjdTdb[i]).toBe(one.bjdTdb);
    }
  });

  it('an empty column gives empty columns', () => {
    const moment = skyMoment(siteOf('south'), Date.UTC(2025, 5, 5, 4));
    expect(starTimeColumns(moment, new Float64Array(0), new Float64Array(0)).bjdTdb).toHaveLength(0);
  });

  it('columns of unequal length are refused, and so is a row without a place, by its number', () => {
    const moment = skyMoment(siteOf('south'), Date.UTC(2025, 5, 5, 4));
    const three = Float64Array.of(1, 2, 3);
    expect(() => starTimeColumns(moment, three, Float64Array.of(1, 2))).toThrow(/differ in length: 3.*2/);
    expect(() => starTimeColumns(moment, three, Float64Array.of(1, 2, 91))).toThrow(/Row 2/);
    expect(() => starTimeColumns(moment, three, Float64Array.of(1, NaN, 3))).toThrow(/Row 1/);
    expect(() => starTimeColumns(moment, Float64Array.of(NaN, 2, 3), three)).toThrow(/Row 0/);
  });

  it('one star without a place, or before 1972, is refused', () => {
    const moment = skyMoment(siteOf('south'), Date.UTC(2025, 5, 5, 4));
    expect(() => starTimes(moment, NaN, 0)).toThrow(/Right ascension/);
    expect(() => lightTravel(moment, 0, 100)).toThrow(/Declination/);
    const early = skyMoment(siteOf('south'), Date.UTC(1960, 0, 1));
    expect(() => starTimes(early, 0, 0)).toThrow(/1972/);
    expect(() => starTimeColumns(early, Float64Array.of(0), Float64Array.of(0))).toThrow(/1972/);
  });
});

const anyRa = fc.double({ min: 0, max: 360, noNaN: true });
const anyDec = fc.double({ min: -90, max: 90, noNaN: true });
