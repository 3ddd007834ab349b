import 'server-only';
import { setTimeout as pause } from 'node:timers/promises';
import { isOutage } from '@/lib/server/data/outage';

const pause_ms = 500;

/** Does the work, again and again for `patience_s` while the database cannot be reached. */
export async function patiently<T>(work: () => Promise<T>, patience_s: number): Promise<T> {
  const end_ms = performance.now() + patience_s * 1000;
  for (;;) {
    try {
      return await work();
    } catch (error) {
      // Only an outage passes by waiting.
      if (!isOutage(error) || performance.now() > end_ms) throw error;
    }
    await pause(pause_ms);
  }
}
