import { describe, expect, it } from 'vitest';
import { moonNight } from '@/lib/astro/moon-night';
import { moonPlace } from '@/lib/astro/moon';
import type { Site } from '@/lib/astro/site';
import { skyMoment } from '@/lib/astro/sky-moment';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf } from '@/tests/support/sky-oracle';

const day = 86_400_000;
const september = Array.from({ length: 30 }, (_, i) => Date.UTC(2026, 8, 1, 12) + i * day);

describe('moonrise and moonset', () => {
  it('at each the upper limb touches the horizon through 34 arcmin of refraction', () => {
    const site = siteOf('north');
    for (const start of september) {
      for (const { utc } of eventsOf(site, start)) {
        const { altitude, semidiameter } = moonPlace(skyMoment(site, utc));
        expectWithin(altitude + semidiameter + 34 / 60, 0, { absolute: 1e-4, unit: 'deg' });
      }
    }
  });

  it('in 30 days at middle latitude it rises and sets 29 times each, never missing more than one a day', () => {
    const events = september.flatMap((start) => eventsOf(siteOf('south'), start));
    expectWithin(events.filter((event) => event.isRise).length, 29, { absolute: 0, unit: 'rises' });
    expectWithin(events.filter((event) => !event.isRise).length, 29, { absolute: 0, unit: 'sets' });
  });

  it('a Moon that is up at a window’s edge is said to be cut by it, and windows join without a gap', () => {
    const site = siteOf('north');
    for (const start of september) {
      const [tonight, tomorrow] = [start, start + day].map((at) =>
        moonNight(site, { start: at, end: at + day }),
      );
      const cutAtEnd = tonight?.kind === 'up-between' && tonight.intervals.at(-1)?.endsAt === 'window edge';
      const cutAtStart = tomorrow?.kind === 'up-between' && tomorrow.intervals[0]?.startsAt === 'window edge';
      expect(cutAtEnd).toBe(cutAtStart);
    }
  });

  it('near the pole it stays up or down for days, and each has its name', () => {
    const site: Site = { longitude: 15, latitude: 78, elevation: 0 };
    const kinds = new Set(september.map((start) => moonNight(site, { start, end: start + day }).kind));
    expect(kinds).toEqual(new Set(['up-between', 'never-up', 'up-throughout']));
  });

  it('a window or a site that cannot be is refused', () => {
    const start = september[0] ?? NaN;
    expect(() => moonNight(siteOf('north'), { start, end: start - 1 })).toThrow(/window/);
    expect(() => moonNight({ ...siteOf('north'), longitude: NaN }, { start, end: start + day })).toThrow(
      /Longitude/,
    );
  });
});

function eventsOf(site: Site, start: number): readonly { utc: number; isRise: boolean }[] {
  const moon = moonNight(site, { start, end: start + day });
  if (moon.kind !== 'up-between') return [];
  return moon.intervals.flatMap((interval) => [
    ...(interval.startsAt === 'crossing' ? [{ utc: interval.start, isRise: true }] : []),
    ...(interval.endsAt === 'crossing' ? [{ utc: interval.end, isRise: false }] : []),
  ]);
}
