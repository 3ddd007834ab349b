import { describe, expect, it } from 'vitest';
import { frameGeometry } from '@/lib/astro/frame-geometry';
import { moonAltitude, moonLight } from '@/lib/astro/moon';
import { nightBounds } from '@/lib/astro/night-bounds';
import { skyMoment } from '@/lib/astro/sky-moment';
import { airmassCurve, skyTrack } from '@/lib/astro/sky-track';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf } from '@/tests/support/sky-oracle';

const site = siteOf('north');
const night = nightBounds('2026-11-02', 'Atlantic/Canary');
const track = skyTrack(site, night, 1800);

describe('the track of Sun and Moon through a night', () => {
  it('has both ends of the night and even steps no longer than asked', () => {
    expect(track.utc).toHaveLength(49);
    expect([track.utc[0], track.utc[48]]).toEqual([night.start, night.end]);
    const uneven = skyTrack(site, { start: 1.7e12, end: 1.7e12 + 100_000 }, 30);
    expect(Array.from(uneven.utc, (utc) => utc - 1.7e12)).toEqual([0, 25_000, 50_000, 75_000, 100_000]);
  });

  it('gives at each point what one moment gives', () => {
    for (const [i, utc] of track.utc.entries()) {
      const moment = skyMoment(site, utc);
      expect(track.moonAltitude[i]).toBe(moonAltitude(moment));
      expect(track.moonIlluminatedFraction[i]).toBe(moonLight(moment).illuminatedFraction);
      expect(track.last_hours[i]).toBe(moment.last_hours);
    }
  });

  it('a field’s curve gives at each point what the frame’s geometry gives', () => {
    const [ra, dec] = [102.890542, -0.192092];
    const curve = airmassCurve(track, ra, dec);
    for (const [i, utc] of track.utc.entries()) {
      const frame = frameGeometry({ site, ra, dec, utcStart: utc, exposure_s: 0 });
      const exact = { absolute: 1e-9, unit: '' };
      expectWithin(curve.altitude[i] ?? NaN, frame.altitude ?? NaN, exact);
      expectWithin(curve.moonSeparation[i] ?? NaN, frame.moonSeparation ?? NaN, exact);
      expectWithin(track.sunAltitude[i] ?? NaN, frame.sunAltitude, exact);
      expect(Number.isNaN(curve.airmass[i])).toBe(frame.airmass === null);
      expectWithin(curve.airmass[i] || 0, frame.airmass ?? 0, exact);
    }
  });

  it('has no airmass below the horizon, and one wherever the altitude is positive', () => {
    const curve = airmassCurve(track, 102.890542, -0.192092);
    const below = Array.from(curve.altitude).filter((altitude) => altitude < 0).length;
    expect(below).toBeGreaterThan(10);
    expect(Array.from(curve.airmass).filter((airmass) => Number.isNaN(airmass))).toHaveLength(below);
  });

  it('can be sent to a worker thread as it is', () => {
    expect(structuredClone(track).moonAltitude).toEqual(track.moonAltitude);
  });

  it.each([0, -60, NaN, 1])('a step of %d s is refused', (step_s) => {
    expect(() => skyTrack(site, night, step_s)).toThrow(/step/);
  });

  it('an empty window and a field off the sky are refused', () => {
    expect(() => skyTrack(site, { start: night.end, end: night.start }, 60)).toThrow(/window/);
    expect(() => airmassCurve(track, NaN, 0)).toThrow(/Right ascension/);
    expect(() => airmassCurve(track, 0, 95)).toThrow(/Declination/);
  });
});
