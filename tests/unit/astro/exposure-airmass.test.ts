import { describe, expect, it } from 'vitest';
import { airmass } from '@/lib/astro/airmass';
import { exposureAirmass, meanAirmass, requireExposure_s } from '@/lib/astro/exposure-airmass';
import { horizontalPlace } from '@/lib/astro/horizontal-place';
import { skyMoment } from '@/lib/astro/sky-moment';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf } from '@/tests/support/sky-oracle';

const site = siteOf('north');
/** SA 98-978 rising through 25 to 40° of altitude. */
const rising = {
  site,
  ra: 102.890542,
  dec: -0.192092,
  utcStart: Date.UTC(2026, 10, 3, 1, 15),
  exposure_s: 3600,
};

describe('airmass over a long exposure', () => {
  it('is (X_start + 4 X_mid + X_end) / 6', () => {
    expectWithin(meanAirmass(1.2, 1.3, 1.5), (1.2 + 5.2 + 1.5) / 6, { absolute: 1e-15, unit: 'airmass' });
  });

  it('is the mean of a fine grid within 0.001, where the value at mid-exposure is off by more than 0.01', () => {
    const fine = Array.from({ length: 600 }, (_, i) => at(rising.utcStart + (i + 0.5) * 6000));
    const mean = fine.reduce((sum, value) => sum + value, 0) / fine.length;
    expectWithin(exposureAirmass('young1994', rising), mean, { absolute: 0.001, unit: 'airmass' });
    expect(Math.abs(at(rising.utcStart + 1_800_000) - mean)).toBeGreaterThan(0.01);
  });

  it('is the airmass of the instant when the shutter only blinks', () => {
    const blink = exposureAirmass('young1994', { ...rising, exposure_s: 0 });
    expectWithin(blink, at(rising.utcStart), { absolute: 1e-12, unit: 'airmass' });
  });

  it('is refused when the field sets before the shutter closes', () => {
    const setting = { ...rising, utcStart: Date.UTC(2026, 10, 3, 10, 0), exposure_s: 7200 };
    expect(() => exposureAirmass('young1994', setting)).toThrow(/below the horizon/);
  });

  it.each([-1, NaN, Infinity, 86_401])('an exposure of %d s is refused', (exposure_s) => {
    expect(() => exposureAirmass('young1994', { ...rising, exposure_s })).toThrow(/Exposure time/);
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

function at(utc: number): number {
  return airmass('young1994', horizontalPlace(skyMoment(site, utc), rising.ra, rising.dec).zenithDistance);
}
