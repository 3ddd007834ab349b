import { describe, expect, it } from 'vitest';
import { fieldVisibility } from '@/lib/astro/field-visibility';
import { frameGeometry } from '@/lib/astro/frame-geometry';
import { skyTrack } from '@/lib/astro/sky-track';
import { expectWithin } from '@/tests/support/numbers';

const site = { longitude: -17.25, latitude: 28.31, elevation: 2300 };
const dark = { start: Date.parse('2026-11-03T19:42:00Z'), end: Date.parse('2026-11-04T06:02:00Z') };
const track = skyTrack(site, dark, 300);
const altitudeAt = (utc: number, ra: number, dec: number): number =>
  frameGeometry({ site, ra, dec, utcStart: utc, exposure_s: 0 }).altitude ?? Number.NaN;

describe('when a field is best', () => {
  it('a field that passes the meridian in the dark is best there', () => {
    const found = fieldVisibility(track, { ra: 58.47, dec: 0.22 }, 20);
    const utcStart = found?.utc ?? Number.NaN;
    const { hourAngle } = frameGeometry({ site, ra: 58.47, dec: 0.22, utcStart, exposure_s: 0 });
    expectWithin(hourAngle ?? Number.NaN, 0, { absolute: 150 / 3600, unit: 'h' });
    expectWithin(found?.airmass ?? Number.NaN, 1.132, { absolute: 0.003, unit: 'airmass' });
  });

  it('one that sets in the evening is best at once, and its span ends where it sinks below the limit', () => {
    const found = fieldVisibility(track, { ra: 280.6, dec: 0.28 }, 25);
    expect(found?.utc).toBe(dark.start);
    expect(found?.from).toBe(dark.start);
    const last = found?.to ?? Number.NaN;
    expect(altitudeAt(last, 280.6, 0.28)).toBeGreaterThan(25);
    expect(altitudeAt(last + 310_000, 280.6, 0.28)).toBeLessThan(25);
  });

  it('one that stays too low is not there', () => {
    expect(fieldVisibility(track, { ra: 162.5, dec: -46 }, 20)).toBeNull();
    expect(fieldVisibility(track, { ra: 10, dec: -80 }, 0)).toBeNull();
  });
});
