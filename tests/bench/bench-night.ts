import { FrameInput } from '@/lib/contracts/api/frame';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { execute, inTransaction } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { newCaller, newLogWorld } from '@/tests/support/log-world';
import { million } from './write-table';

export interface BenchNight {
  readonly caller: PersonCaller;
  /** Public id of the night. */
  readonly id: string;
}

let made: Promise<BenchNight> | undefined;

/** The night of all benches, with the frames that a million rows are of, and its observer; made once. */
export function benchNight(): Promise<BenchNight> {
  made ??= makeNight(million.frames);
  return made;
}

async function makeNight(frames: number): Promise<BenchNight> {
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

/** Removes a set: the next table is to find the database as this one did. */
export async function forgetSet(set: string): Promise<void> {
  await inTransaction(async (tx) => {
    const ofSet = 'WHERE set_id = (SELECT id FROM measurement_sets WHERE public_id = :set)';
    for (const table of [
      'measurements',
      'measurement_stars',
      'measurement_flags',
      'measurement_set_frames',
    ]) {
      await execute(`DELETE FROM ${table} ${ofSet}`, { set }, tx);
    }
    await execute('DELETE FROM measurement_sets WHERE public_id = :set', { set }, tx);
  });
}
