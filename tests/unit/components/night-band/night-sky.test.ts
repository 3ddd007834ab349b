import { describe, expect, it } from 'vitest';
import { nightSky } from '@/app/_components/charts/night-band/night-sky';
import { autumnNight, marrowHill } from './night';

const at = (text: string) => Date.parse(text);

describe('the sky of the night band', () => {
  it('runs from sunset to sunrise with the twilights in their order', () => {
    const sky = autumnNight();
    const { start, sunset, duskEnds, dawnBegins, sunrise, end } = sky;
    expect([start, end]).toEqual([expect.closeTo(sunset ?? 0, -3), expect.closeTo(sunrise ?? 0, -3)]);
    expect([sunset, duskEnds, dawnBegins, sunrise]).toEqual(
      [sunset, duskEnds, dawnBegins, sunrise].toSorted((a, b) => (a ?? 0) - (b ?? 0)),
    );
    expect(sky.sunNote).toBeNull();
  });

  it('grows to hold frames in daylight close by, and not for those of the afternoon', () => {
    const flats = at('2026-11-03T17:50:00Z');
    const bias = at('2026-11-03T14:00:00Z');
    const sky = autumnNight([flats, bias]);
    expect(sky.start).toBeLessThan(flats);
    expect(sky.start).toBeGreaterThan(bias);
  });

  it('says so where the Sun does not set, and shows noon to noon', () => {
    const sky = nightSky({
      site: { longitude: 18.9, latitude: 69.6, elevation: 100, timezone: 'Europe/Oslo' },
      date: '2026-06-20',
      fields: [],
    });
    expect(sky.sunNote).toBe('The Sun does not set');
    expect(sky.sunset).toBeNull();
    expect(sky.end - sky.start).toBe(86_400_000);
  });

  it('says so where the night has twilight only', () => {
    const site = { longitude: 10, latitude: 54, elevation: 0, timezone: 'Europe/Berlin' };
    const sky = nightSky({ site, date: '2026-06-20', fields: [] });
    expect(sky.sunNote).toBe('No astronomical darkness');
    expect(sky.sunset).not.toBeNull();
    expect(sky.duskEnds).toBeNull();
  });

  it('has no airmass where a field is below the horizon, and one of at least 1 elsewhere', () => {
    const south = { name: 'far south', ra: 0, dec: -85 };
    const sky = nightSky({
      site: marrowHill,
      date: '2026-11-03',
      fields: [south, { name: 'a', ra: 20, dec: 28 }],
    });
    expect(sky.curves[0]?.airmass.every((airmass) => airmass === null)).toBe(true);
    expect(
      Math.min(...(sky.curves[1]?.airmass ?? []).filter((airmass) => airmass !== null)),
    ).toBeGreaterThanOrEqual(1);
  });

  it('is the same data whenever it is made', () => {
    expect(autumnNight()).toEqual(autumnNight());
  });
});
