import { describe, expect, it } from 'vitest';
import { type SunBelow, type SunLimit, sunLimits, sunNight } from '@/lib/astro/sun-night';
import { skyMoment } from '@/lib/astro/sky-moment';
import { sunAltitude } from '@/lib/astro/sun';
import { expectWithin } from '@/tests/support/numbers';
import { highLatitudeNights, siteOf, skyNights, utcOf } from '@/tests/support/sky-oracle';

const minute = { absolute: 60_000, unit: 'ms' } as const;
const day = 86_400_000;

type Night = (typeof skyNights)[number] | (typeof highLatitudeNights)[number];

/** What the oracle calls the two ends of each interval. */
function endsOf(night: Night): readonly (readonly [SunLimit, string | null, string | null])[] {
  return [
    ['horizon', night.sunset_utc, night.sunrise_utc],
    ['civil', night.civil_end_utc, night.civil_start_utc],
    ['nautical', night.nautical_end_utc, night.nautical_start_utc],
    ['astronomical', night.astronomical_end_utc, night.astronomical_start_utc],
  ];
}

describe('sunset, twilights and sunrise', () => {
  it.each(skyNights)('$site, $evening_date_local: all eight are within 60 s of the oracle', (night) => {
    const { limits } = sunNight(night.place, night.window);
    for (const [limit, evening, morning] of endsOf(night)) {
      const below = requireInterval(limits[limit]);
      expectWithin(below.start, utcOf(evening ?? ''), minute);
      expectWithin(below.end, utcOf(morning ?? ''), minute);
      expect([below.startsAt, below.endsAt]).toEqual(['crossing', 'crossing']);
    }
  });

  it.each(skyNights)(
    '$site, $evening_date_local: in fact they are within 1 s, with UT1 = UTC as there',
    (night) => {
      const { limits } = sunNight(night.place, night.window);
      for (const [limit, evening, morning] of endsOf(night)) {
        const below = requireInterval(limits[limit]);
        expectWithin(below.start, utcOf(evening ?? ''), { absolute: 1000, unit: 'ms' });
        expectWithin(below.end, utcOf(morning ?? ''), { absolute: 1000, unit: 'ms' });
      }
    },
  );

  it.each([...skyNights, ...highLatitudeNights])(
    '$site, $evening_date_local: the Sun’s lowest point is the oracle’s lowest sample, or a little below it',
    (night) => {
      const { lowest } = sunNight(night.place, night.window);
      expect(lowest.altitude).toBeLessThan(night.sun_lowest_alt_deg + 0.002);
      expectWithin(lowest.altitude, night.sun_lowest_alt_deg, { absolute: 0.1, unit: 'deg' });
    },
  );

  it('the Sun stands at the limit at each crossing', () => {
    const site = siteOf('south');
    const { limits } = sunNight(site, { start: Date.UTC(2026, 3, 11, 16), end: Date.UTC(2026, 3, 12, 16) });
    for (const [limit, altitude] of Object.entries(sunLimits)) {
      const below = requireInterval(limits[limit as SunLimit]);
      for (const utc of [below.start, below.end]) {
        expectWithin(sunAltitude(skyMoment(site, utc)), altitude, { absolute: 1e-4, unit: 'deg' });
      }
    }
  });
});

describe('nights without some twilights, at high latitude', () => {
  it.each(highLatitudeNights)(
    '$site, $evening_date_local: events that the oracle lacks have a named outcome',
    (night) => {
      const { limits, lowest } = sunNight(night.place, night.window);
      const missing = endsOf(night).filter(([, evening, morning]) => evening === null || morning === null);
      const there = endsOf(night).filter(([, evening, morning]) => evening !== null && morning !== null);
      expect(missing.map(([limit]) => limits[limit].kind)).toEqual(
        missing.map(([limit]) => (lowest.altitude < sunLimits[limit] ? 'below-throughout' : 'never-below')),
      );
      for (const [limit, evening, morning] of there) {
        const interval = requireInterval(limits[limit]);
        expectWithin(interval.start, utcOf(evening ?? ''), minute);
        expectWithin(interval.end, utcOf(morning ?? ''), minute);
      }
    },
  );

  it('at 60° north a June night has civil twilight and nothing darker', () => {
    const kinds = kindsOf('high60', Date.UTC(2025, 5, 21, 11));
    expect(kinds).toEqual({
      horizon: 'below-between',
      civil: 'below-between',
      nautical: 'never-below',
      astronomical: 'never-below',
    });
  });

  it('at 70° north the Sun does not set in June and does not rise in December', () => {
    expect(kindsOf('high69', Date.UTC(2025, 5, 21, 11)).horizon).toBe('never-below');
    const winter = kindsOf('high69', Date.UTC(2024, 11, 21, 11));
    expect(winter.horizon).toBe('below-throughout');
    expect(winter.astronomical).toBe('below-between');
  });

  it('on the day of the first sunrise after the polar night the darkness began before the window did', () => {
    const site = siteOf('high69');
    const nights = Array.from({ length: 30 }, (_, i) => {
      const start = Date.UTC(2025, 0, 1, 10, 44) + i * day;
      return sunNight(site, { start, end: start + day }).limits.horizon;
    });
    const first = nights.find((below) => below.kind !== 'below-throughout');
    expect(first).toMatchObject({ kind: 'below-between', startsAt: 'window edge', endsAt: 'crossing' });
  });

  it('when a short day cuts the window in two, the night is the part with the lowest Sun', () => {
    const site = siteOf('high69');
    // Two hours before a noon in mid-January: dark, a Sun above the limit for a while, dark again.
    const start = Date.UTC(2025, 0, 20, 8);
    const { limits, lowest } = sunNight(site, { start, end: start + day });
    const night = requireInterval(limits.horizon);
    expect(night.startsAt).toBe('crossing');
    expect(night.start).toBeLessThan(lowest.utc);
    expect(night.end).toBeGreaterThan(lowest.utc);
    expect(lowest.utc - start).toBeGreaterThan(day / 2);
  });

  it.each([
    ['at the north pole', 90],
    ['at the south pole', -90],
  ])('%s, where the Sun goes round level, there is an answer', (_, latitude) => {
    const start = Date.UTC(2026, 5, 21);
    const { limits } = sunNight({ longitude: 0, latitude, elevation: 0 }, { start, end: start + day });
    expect(limits.horizon.kind).toBe(latitude > 0 ? 'never-below' : 'below-throughout');
  });
});

describe('what is no night is refused', () => {
  const start = Date.UTC(2026, 10, 2, 12);

  it('a window that ends before it starts, or has no end', () => {
    expect(() => sunNight(siteOf('north'), { start, end: start })).toThrow(/window/);
    expect(() => sunNight(siteOf('north'), { start, end: NaN })).toThrow(/window/);
    expect(() => sunNight(siteOf('north'), { start, end: start + 41 * day })).toThrow(/40 days/);
  });

  it('an impossible site', () => {
    expect(() => sunNight({ ...siteOf('north'), latitude: 91 }, { start, end: start + day })).toThrow(
      /Latitude/,
    );
  });
});

function requireInterval(below: SunBelow): Extract<SunBelow, { kind: 'below-between' }> {
  if (below.kind !== 'below-between') throw new Error(`Expected an interval, not ${below.kind}.`);
  return below;
}

function kindsOf(site: string, start: number): Record<SunLimit, SunBelow['kind']> {
  const { limits } = sunNight(siteOf(site), { start, end: start + day });
  return {
    horizon: limits.horizon.kind,
    civil: limits.civil.kind,
    nautical: limits.nautical.kind,
    astronomical: limits.astronomical.kind,
  };
}
