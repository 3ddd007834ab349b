import { describe, expect, it } from 'vitest';
import { frameGeometry } from '@/lib/astro/frame-geometry';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf, skyCases, utcOf } from '@/tests/support/sky-oracle';

const degree = { absolute: 0.01, unit: 'deg' } as const;
const frame = {
  site: siteOf('north'),
  ra: 102.890542,
  dec: -0.192092,
  utcStart: Date.UTC(2026, 10, 3, 1, 0, 0),
  exposure_s: 120,
};

describe('the geometry of a frame', () => {
  it.each(skyCases)('case $id: at mid-exposure all figures are those of the oracle', (sky) => {
    const exposure_s = 90;
    const geometry = frameGeometry({
      site: sky.place,
      ra: sky.ra_icrs_deg,
      dec: sky.dec_icrs_deg,
      utcStart: utcOf(sky.utc) - 45_000,
      exposure_s,
    });
    expect(geometry.utcMid).toBe(utcOf(sky.utc));
    expectWithin(geometry.altitude ?? NaN, sky.alt_deg, degree);
    expectWithin(15 * (geometry.hourAngle ?? NaN), 15 * sky.hour_angle_h, degree);
    expectWithin(geometry.moonSeparation ?? NaN, sky.moon_target_separation_deg, {
      absolute: 0.02,
      unit: 'deg',
    });
    expectWithin(geometry.sunAltitude, sky.sun_alt_deg, { absolute: 0.02, unit: 'deg' });
    expect(geometry.airmass === null).toBe(sky.airmass_young1994 === null);
    // An arcsecond of altitude is worth sec z tan z of itself, and more of it lower down.
    const slope = sky.airmass_young1994 === null ? 0 : sky.airmass_young1994 ** 2 * (Math.PI / 180);
    expectWithin(geometry.airmass ?? 0, sky.airmass_young1994 ?? 0, {
      absolute: 1e-5 + slope * 0.0002,
      unit: 'airmass',
    });
  });

  it('is that of mid-exposure, not of the start', () => {
    const long = frameGeometry({ ...frame, exposure_s: 3600 });
    const blinkAtMid = frameGeometry({ ...frame, utcStart: frame.utcStart + 1_800_000, exposure_s: 0 });
    expect(long).toEqual(blinkAtMid);
    expect(long.airmass).not.toBe(frameGeometry({ ...frame, exposure_s: 0 }).airmass);
  });

  it('below the horizon there is an altitude but no airmass', () => {
    const set = frameGeometry({ ...frame, utcStart: Date.UTC(2026, 10, 3, 18) });
    expect(set.airmass).toBeNull();
    expect(set.altitude).toBeLessThan(0);
  });

  it('a frame that points nowhere still has its time and its Sun', () => {
    const bias = frameGeometry({ ...frame, ra: null, dec: null });
    const pointed = frameGeometry(frame);
    expect(bias).toEqual({
      utcMid: pointed.utcMid,
      airmass: null,
      altitude: null,
      hourAngle: null,
      moonSeparation: null,
      sunAltitude: pointed.sunAltitude,
    });
  });

  it('half a position is refused', () => {
    expect(() => frameGeometry({ ...frame, dec: null })).toThrow(/both/);
    expect(() => frameGeometry({ ...frame, ra: null })).toThrow(/both/);
  });

  it.each([
    [{ exposure_s: -1 }, /Exposure/],
    [{ exposure_s: NaN }, /Exposure/],
    [{ utcStart: NaN }, /instant/],
    [{ utcStart: Date.UTC(1899, 0) }, /1900/],
    [{ ra: NaN }, /Right ascension/],
    [{ dec: 91 }, /Declination/],
  ])('%j is refused', (change, message) => {
    expect(() => frameGeometry({ ...frame, ...change })).toThrow(message);
  });
});
