'use client';

import { useEffect, useState } from 'react';

/**
 * The present time, ms: first the figure that the server made the page with, so that both render the same, then the
 * browser's own, renewed at every full period.
 */
export function useNow(first: number, period_ms = 1000): number {
  const [now, setNow] = useState(first);
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout>;
    const tick = () => {
      const present = Date.now();
      setNow(present);
      timer = setTimeout(tick, period_ms - (present % period_ms));
    };
    tick();
    return () => clearTimeout(timer);
  }, [period_ms]);
  return now;
}
