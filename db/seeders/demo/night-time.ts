import { nightBounds, type NightBounds } from '@/lib/astro/night-bounds';
import { sunNight } from '@/lib/astro/sun-night';
import type { DemoSite } from './demo-world';

/** The hours of one night [ms since 1970]. */
export interface NightTimes {
  readonly date: string;
  readonly bounds: NightBounds;
  readonly sunset: number;
  /** End of astronomical twilight in the evening, and its beginning in the morning. */
  readonly dusk: number;
  readonly dawn: number;
}

export const minute_ms = 60_000;

/** When it is dark at the demo's site, which lies where it gets dark in every night of the year. */
export function nightTimes(site: DemoSite, date: string): NightTimes {
  const bounds = nightBounds(date, site.timezone);
  const { horizon, astronomical } = sunNight(site, bounds).limits;
  if (horizon.kind !== 'below-between' || astronomical.kind !== 'below-between') {
    throw new Error(`At ${site.name} it does not get dark in the night ${date}.`);
  }
  return { date, bounds, sunset: horizon.start, dusk: astronomical.start, dawn: astronomical.end };
}

/** The instant within the night at which clocks of UTC show hours and minutes [ms since 1970]. */
export function clockTime(night: NightTimes, hoursAndMinutes: string): number {
  const evening = Date.parse(`${night.date}T${hoursAndMinutes}:00Z`);
  return evening >= night.bounds.start ? evening : evening + 24 * 60 * minute_ms;
}
