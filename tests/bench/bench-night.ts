import { createReadStream } from 'node:fs';
import path from 'node:path';
import { FrameInput } from '@/lib/contracts/api/frame';
import { UploadQuery } from '@/lib/contracts/api/measurement-set';
import type { JobKind } from '@/lib/contracts/job-kinds';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { receiveMeasurements } from '@/lib/server/acts/receive-measurements';
import { storeMeasurements } from '@/lib/server/acts/store-measurements';
import { execute, inTransaction } from '@/lib/server/data/database';
import { lucia, sessionCookieName } from '@/lib/server/identity/sessions';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { newCaller, newLogWorld } from '@/tests/support/log-world';
import type { JobRun } from '@/workers/handler';
import { checkMeasurements } from '@/workers/handlers/check-measurements';
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

/** The cookie of a session of the person, for calls of the built application. */
export async function sessionCookie({ personId }: PersonCaller): Promise<string> {
  const session = await inTransaction((tx) => lucia(tx).createSession(personId, { userAgent: 'bench' }));
  return `${sessionCookieName}=${session.id}`;
}

/** Takes a table from its first byte to the matched set, as a worker's process does it; public id of the set. */
export async function takeTable(
  { caller, id }: BenchNight,
  file: string,
  query: Record<string, string> = {},
): Promise<string> {
  const stored = await storeMeasurements(caller, id, createReadStream(file));
  const received = { ...stored, fileName: path.basename(file), contentType: 'text/csv' };
  const { set } = await receiveMeasurements(caller, id, UploadQuery.parse(query), received);
  const result = await checkMeasurements(runOf('bench-check', { set }));
  if (result.state !== 'matched') throw new Error(`The table was refused: ${result.faults} faults.`);
  return set;
}

/** A run of a job without a runner. */
export const runOf = <K extends JobKind>(id: string, payload: JobRun<K>['payload']): JobRun<K> => ({
  id,
  payload,
  caller: { kind: 'job', jobId: id, personId: null, requestId: 'bench' },
  attempt: 1,
  maxTries: 1,
  signal: new AbortController().signal,
  progress: () => undefined,
});

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
