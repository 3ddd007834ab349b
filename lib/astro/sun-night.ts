import {
  type AltitudePoint,
  type Interval,
  type TimeWindow,
  intervalsBelow,
  turningPoints,
} from './altitude-search';
import { requireSite, type Site } from './site';
import { skyMoment } from './sky-moment';
import { sunAltitude } from './sun';

/** Altitude of the Sun's centre, without refraction, at each of the four limits of darkness. [deg]
 * @source horizon: 34 arcmin of refraction and 16 arcmin of semidiameter, no dip, as almanacs have it; the others by
 *   definition of the twilights */
export const sunLimits = { horizon: -50 / 60, civil: -6, nautical: -12, astronomical: -18 } as const;
export type SunLimit = keyof typeof sunLimits;

/**
 * What the Sun does about a limit during a night. At high latitudes it may stay on one side of it: that is an outcome
 * with its own name, and the interval's ends say whether they are events or only the edges of the night.
 */
export type SunBelow =
  | ({ readonly kind: 'below-between' } & Interval)
  | { readonly kind: 'never-below' }
  | { readonly kind: 'below-throughout' };

export interface SunNight {
  readonly limits: Readonly<Record<SunLimit, SunBelow>>;
  /** The Sun's lowest point in the window. */
  readonly lowest: AltitudePoint;
}

/** Sunset, the three twilights and sunrise of one night.
 * @param site - longitude, latitude [deg], elevation [m]
 * @param window - the night, as a rule from nightBounds [ms since 1970]
 * @returns for each limit the interval in which the Sun is below it (start is sunset or dusk, end is dawn or sunrise),
 *   or that there is none, or that it is all of the night; where short days cut the window in two, the interval around
 *   the lowest Sun
 * @throws {RangeError} impossible site; window empty, longer than 40 days or outside 1900 to 2099
 * @accuracy 1 s against ERFA with UT1 = UTC; minutes where the Sun grazes a limit at high latitude
 * @source definition; Sun of astronomy-engine 2.1.19 */
export function sunNight(site: Site, window: TimeWindow): SunNight {
  requireSite(site);
  const altitudeAt = (utc: number) => sunAltitude(skyMoment(site, utc));
  const points = turningPoints(altitudeAt, window);
  const lowest = points.reduce((low, point) => (point.altitude < low.altitude ? point : low));
  const outcome = (limit: SunLimit): SunBelow => {
    const intervals = intervalsBelow(altitudeAt, points, sunLimits[limit]);
    const night = intervals.find((interval) => interval.start <= lowest.utc && lowest.utc <= interval.end);
    if (night === undefined) return { kind: 'never-below' };
    if (night.startsAt === 'window edge' && night.endsAt === 'window edge')
      return { kind: 'below-throughout' };
    return { kind: 'below-between', ...night };
  };
  return {
    limits: {
      horizon: outcome('horizon'),
      civil: outcome('civil'),
      nautical: outcome('nautical'),
      astronomical: outcome('astronomical'),
    },
    lowest,
  };
}
