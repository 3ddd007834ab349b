import { describe, expect, it } from 'vitest';
import { airmass, airmassFormulas } from '@/lib/astro/airmass';
import {
  airmassAt,
  exposureSky,
  meanAirmass,
  measuredAirmasses,
  requireExposure_s,
  type Exposure,
} from '@/lib/astro/exposure-airmass';
import { horizontalPlace } from '@/lib/astro/horizontal-place';
import { skyMoment } from '@/lib/astro/sky-moment';
import { directionOf } from '@/lib/astro/vector';
import { createRandom } from '@/lib/numerics/random';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf } from '@/tests/support/sky-oracle';

const site = siteOf('north');
/** SA 98-978 rising through 25 to 40° of altitude. */
const rising = {
  ra: 102.890542,
  dec: -0.192092,
  utcStart: Date.UTC(2026, 10, 3, 1, 15),
  exposure_s: 3600,
};
const over = (exposure: Exposure): number =>
  airmassAt('young1994', exposureSky(site, exposure), directionOf(rising.ra, rising.dec));

describe('airmass over a long exposure', () => {
  it('is (X_start + 4 X_mid + X_end) / 6', () => {
    expectWithin(meanAirmass(1.2, 1.3, 1.5), (1.2 + 5.2 + 1.5) / 6, { absolute: 1e-15, unit: 'airmass' });
  });

  it('is the mean of a fine grid within 0.001, where the value at mid-exposure is off by more than 0.01', () => {
    const fine = Array.from({ length: 600 }, (_, i) => at(rising.utcStart + (i + 0.5) * 6000));
    const mean = fine.reduce((sum, value) => sum + value, 0) / fine.length;
    expectWithin(over(rising), mean, { absolute: 0.001, unit: 'airmass' });
    expect(Math.abs(at(rising.utcStart + 1_800_000) - mean)).toBeGreaterThan(0.01);
  });

  it('is the airmass of the instant when the shutter only blinks', () => {
    const blink = over({ ...rising, exposure_s: 0 });
    expectWithin(blink, at(rising.utcStart), { absolute: 1e-12, unit: 'airmass' });
  });

  it('is refused when the field sets before the shutter closes', () => {
    const setting = { ...rising, utcStart: Date.UTC(2026, 10, 3, 10, 0), exposure_s: 7200 };
    expect(() => over(setting)).toThrow(/below the horizon/);
  });

  it.each([-1, NaN, Infinity, 86_401])('an exposure of %d s is refused', (exposure_s) => {
    expect(() => over({ ...rising, exposure_s })).toThrow(/Exposure time/);
    expect(() => requireExposure_s(exposure_s)).toThrow(/Exposure time/);
  });

  it.each([
    [NaN, 1, 1],
    [1, 0.5, 1],
    [1, 1, Infinity],
  ])('a mean of %d, %d and %d is refused', (start, mid, end) => {
    expect(() => meanAirmass(start, mid, end)).toThrow(/Airmass/);
  });
});

describe('airmasses of many stars on many frames', () => {
  const exposures = [0, 1800, 5400, 9000].map((later_s) => ({
    utcStart: rising.utcStart + later_s * 1000,
    exposure_s: 600,
  }));
  const skies = exposures.map((exposure) => exposureSky(site, exposure));

  /** Stars over 30° around the field, all on each frame. */
  function wideField(nStars: number) {
    const random = createRandom(11);
    const place = (middle: number): Float64Array =>
      Float64Array.from({ length: nStars }, () => middle + 30 * (random.uniform() - 0.5));
    const rows = Array.from({ length: nStars * skies.length }, (_, m) => m);
    return {
      ra: place(rising.ra),
      dec: place(rising.dec),
      star: Uint32Array.from(rows, (m) => m % nStars),
      frame: Uint32Array.from(rows, (m) => Math.floor(m / nStars)),
    };
  }

  it.each(airmassFormulas)('by %s are those that the altitude gives, star by star and instant', (formula) => {
    const field = wideField(50);
    const found = measuredAirmasses(formula, skies, field);
    let [least, most] = [Infinity, 0];
    for (const [m, value] of found.entries()) {
      const { utcStart, exposure_s } = exposures[field.frame[m] ?? -1] ?? { utcStart: NaN, exposure_s: NaN };
      const star = field.star[m] ?? -1;
      const place = [field.ra[star] ?? NaN, field.dec[star] ?? NaN] as const;
      const [start = NaN, mid = NaN, end = NaN] = [0, 0.5, 1].map((part) => {
        const moment = skyMoment(site, utcStart + part * exposure_s * 1000);
        return airmass(formula, horizontalPlace(moment, ...place).zenithDistance);
      });
      expectWithin(value, (start + 4 * mid + end) / 6, { absolute: 1e-9, unit: 'airmass' });
      if (field.frame[m] === 0) [least, most] = [Math.min(least, value), Math.max(most, value)];
    }
    expect(most - least).toBeGreaterThan(0.5);
  });

  it('are none without a place, without a sky, and below the horizon, and the others keep theirs', () => {
    const [sky = null] = skies;
    const found = measuredAirmasses('young1994', [sky, null], {
      ra: Float64Array.of(rising.ra, NaN, rising.ra + 180),
      dec: Float64Array.of(rising.dec, NaN, rising.dec),
      star: Uint32Array.of(1, 2, 0, 0),
      frame: Uint32Array.of(0, 0, 1, 0),
    });
    expect([...found.subarray(0, 3)]).toEqual([NaN, NaN, NaN]);
    const own = over({ ...rising, exposure_s: 600 });
    expectWithin(found[3] ?? NaN, own, { absolute: 1e-12, unit: 'airmass' });
  });

  it('are none beyond what the formula holds for', () => {
    // From zenith distances of 80 to 90° at this instant.
    const dec = Float64Array.from({ length: 60 }, (_, s) => rising.dec - s);
    const stars = { ra: new Float64Array(60).fill(rising.ra), dec, frame: new Uint32Array(60) };
    const star = Uint32Array.from(dec.keys());
    const nNone = (formula: 'young1994' | 'hardie1962'): number =>
      measuredAirmasses(formula, skies, { ...stars, star }).filter(Number.isNaN).length;
    expect(nNone('hardie1962')).toBeGreaterThan(nNone('young1994'));
  });

  it('are refused when stars and frames do not pair', () => {
    const field = wideField(2);
    expect(() => measuredAirmasses('young1994', skies, { ...field, frame: new Uint32Array(1) })).toThrow(
      /in pairs/,
    );
  });
});

function at(utc: number): number {
  return airmass('young1994', horizontalPlace(skyMoment(site, utc), rising.ra, rising.dec).zenithDistance);
}
