'use client';

import { useEffect, useState } from 'react';
import { formatClock, formatLocalMinutes } from '../ui/format-time';

/** What the clocks need to know of a place. */
export interface ClockSite {
  readonly name: string;
  readonly timezone: string;
  /** deg, east positive */
  readonly longitude: number;
}

interface ClocksProps {
  readonly site: ClockSite | null;
  /** The server's clock when it made the page, ms: the browser starts from the same figure, then from its own. */
  readonly serverNow: number;
}

/** The present second, from the server's first figure on; ticks on the full second. */
function useNow(serverNow: number): number {
  const [now, setNow] = useState(serverNow);
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout>;
    const tick = () => {
      const present = Date.now();
      setNow(present);
      timer = setTimeout(tick, 1000 - (present % 1000));
    };
    tick();
    return () => clearTimeout(timer);
  }, []);
  return now;
}

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
        <span>
          <span className="font-mono">{formatLocalMinutes(now, site.timezone)}</span> {site.name}
        </span>
      )}
    </p>
  );
}
