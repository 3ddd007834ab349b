import { FrameInput } from '@/lib/contracts/api/frame';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { newCaller, newLogWorld } from '@/tests/support/log-world';

export interface BenchNight {
  readonly caller: PersonCaller;
  /** Public id of the night. */
  readonly id: string;
}

/** A night with so many frames of one field, and its observer. */
export async function benchNight(frames: number): Promise<BenchNight> {
  await newLogWorld();
  const caller = await newCaller('Noor Hathaway', { roles: ['observer'] });
  const night = await openNight(caller, { telescope: 'larkspur', date: '2026-11-03' });
  const start = Date.UTC(2026, 10, 3, 20);
  const inputs = Array.from({ length: frames }, (_, index) =>
    FrameInput.parse({
      type: 'target',
      object: 'Thistle 3',
      band: index % 2 === 0 ? 'V' : 'B',
      utc_start: new Date(start + index * 90_000).toISOString(),
      exposure: 60,
    }),
  );
  await logFrames(caller, night.id, inputs, { origin: 'log', isList: true });
  return { caller, id: night.id };
}
