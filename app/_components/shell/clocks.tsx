'use client';

import { formatHours } from '@/lib/astro/format-sexagesimal';
import { useNow } from '../hooks/use-now';
import { formatClock, formatLocalMinutes } from '../ui/format-time';

/** What the clocks need to know of a place. */
export interface ClockSite {
  readonly name: string;
  readonly timezone: string;
  /** Local apparent sidereal time when the server made the page, hours. */
  readonly siderealAtServerNow_hours: number;
}

interface ClocksProps {
  readonly site: ClockSite | null;
  /** The server's clock when it made the page, ms: the browser starts from the same figure, then from its own. */
  readonly serverNow: number;
}

/** Hours of the stars' day per millisecond of the clock. */
const siderealRate_hours = 1.002_737_909_35 / 3_600_000;

/** UTC first, the place's own time and the stars' second. */
export function Clocks({ site, serverNow }: ClocksProps) {
  const now = Math.floor(useNow(serverNow) / 1000) * 1000;
  return (
    <p
      className="flex flex-wrap items-baseline gap-x-3 text-table whitespace-nowrap text-ink-2"
      role="timer"
      aria-live="off"
    >
      <span>
        <b className="font-mono font-medium text-ink">{formatClock(now)}</b> UTC
      </span>
      {site === null ? null : (
        <>
          <span>
            <span className="font-mono">{formatLocalMinutes(now, site.timezone)}</span> {site.name}
          </span>
          <span>
            <span className="font-mono">
              {formatHours(site.siderealAtServerNow_hours + (now - serverNow) * siderealRate_hours).slice(
                0,
                5,
              )}
            </span>{' '}
            sidereal
          </span>
        </>
      )}
    </p>
  );
}
