import { type Interval, type TimeWindow, intervalsBelow, turningPoints } from './altitude-search';
import { altitudeOf } from './horizontal-place';
import { moonDirection, moonSemidiameter } from './moon';
import { requireSite, type Site } from './site';
import { skyMoment } from './sky-moment';

/** Refraction at the horizon, as almanacs have it. [deg] @source 34 arcmin, common practice of almanacs */
const horizonRefraction = 34 / 60;

/** What the Moon does during a night: near the poles it may stay up, or down, for days. */
export type MoonUp =
  | { readonly kind: 'up-between'; readonly intervals: readonly Interval[] }
  | { readonly kind: 'never-up' }
  | { readonly kind: 'up-throughout' };

/** Moonrise and moonset of one night.
 * @param site - longitude, latitude [deg], elevation [m]
 * @param window - the night, as a rule from nightBounds [ms since 1970]
 * @returns the intervals with the Moon up (start is moonrise, end is moonset, unless they are the window's edge), or
 *   that it never is, or always; the upper limb counts, with 34 arcmin of refraction and no dip
 * @throws {RangeError} impossible site; window empty, longer than 40 days or outside 1900 to 2099
 * @accuracy 2 s against the engine's own search with UT1 = UTC; minutes where the Moon grazes the horizon
 * @source definition; Moon of astronomy-engine 2.1.19 */
export function moonNight(site: Site, window: TimeWindow): MoonUp {
  requireSite(site);
  const depthAt = (utc: number) => {
    const moment = skyMoment(site, utc);
    const direction = moonDirection(moment);
    return -(altitudeOf(moment, direction) + moonSemidiameter(direction) + horizonRefraction);
  };
  const intervals = intervalsBelow(depthAt, turningPoints(depthAt, window), 0);
  const [only] = intervals;
  if (only === undefined) return { kind: 'never-up' };
  if (only.startsAt === 'window edge' && only.endsAt === 'window edge') return { kind: 'up-throughout' };
  return { kind: 'up-between', intervals };
}
