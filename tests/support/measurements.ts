import { mkdtempSync, readFileSync } from 'node:fs';
import { readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll } from 'vitest';
import { UploadQuery, type Queued } from '@/lib/contracts/api/measurement-set';
import { receiveMeasurements } from '@/lib/server/acts/receive-measurements';
import { storeMeasurements } from '@/lib/server/acts/store-measurements';
import { select, selectOne } from '@/lib/server/data/database';
import type { JobCaller, PersonCaller } from '@/lib/server/policy/caller';
import { originalPath } from '@/lib/server/storage/originals';
import { checkMeasurements } from '@/workers/handlers/check-measurements';
import type { JobRun } from '@/workers/handler';

/** Originals of this test file. The environment is read once, at the first use. */
const dataFolder = mkdtempSync(path.join(tmpdir(), 'evenfall-originals-'));
process.env['DATA_DIR'] = dataFolder;
export const removeOriginals = (): void => {
  afterAll(() => rm(dataFolder, { recursive: true, force: true }));
};

async function* bytesOf(content: string | Uint8Array): AsyncGenerator<Uint8Array> {
  yield await Promise.resolve(typeof content === 'string' ? Buffer.from(content) : content);
}

/** Uploads a table as the HTTP interface does: its bytes, then its set and job. */
export async function upload(
  caller: PersonCaller,
  night: string,
  content: string | Uint8Array,
  query: Record<string, string> = {},
): Promise<Queued> {
  const stored = await storeMeasurements(caller, night, bytesOf(content));
  const file = { ...stored, fileName: 'table.csv', contentType: 'text/csv' };
  return receiveMeasurements(caller, night, UploadQuery.parse(query), file);
}

export interface Checking extends Partial<JobRun<'check-measurements'>> {
  readonly set: string;
  readonly person?: PersonCaller;
}

/** Does the check of a set as a runner would, without one. */
export function check({ set, person, ...run }: Checking): ReturnType<typeof checkMeasurements> {
  const caller: JobCaller = {
    kind: 'job',
    jobId: 'test',
    personId: person?.personId ?? null,
    requestId: 'test',
  };
  return checkMeasurements({
    id: 'test',
    payload: { set },
    caller,
    attempt: 1,
    maxTries: 3,
    signal: new AbortController().signal,
    progress: () => undefined,
    ...run,
  });
}

export interface SetNow {
  readonly id: number;
  readonly state: string;
  readonly nRows: number | null;
  readonly nMatched: number | null;
  readonly nFaults: number;
  readonly nFramesCreated: number;
  readonly comments: string;
  readonly mapping: Record<string, string>;
  /** Rows of each table that belong to the set. */
  readonly measurements: number;
  readonly stars: number;
  readonly flags: number;
  readonly faults: number;
  readonly frames: number;
}

export async function setNow(publicId: string): Promise<SetNow> {
  const count = (table: string): string => `(SELECT COUNT(*) FROM ${table} t WHERE t.set_id = m.id)`;
  const row = await selectOne<SetNow>(
    `SELECT m.id, m.state, m.n_rows AS nRows, m.n_matched AS nMatched, m.n_faults AS nFaults,
            m.n_frames_created AS nFramesCreated, m.comments, m.mapping,
            ${count('measurements')} AS measurements, ${count('measurement_stars')} AS stars,
            ${count('measurement_flags')} AS flags, ${count('measurement_faults')} AS faults,
            ${count('measurement_set_frames')} AS frames
       FROM measurement_sets m WHERE m.public_id = :publicId`,
    { publicId },
  );
  if (!row) throw new Error(`There is no set ${publicId}.`);
  return row;
}

export const mailsOf = (
  kind: string,
): Promise<readonly { readonly recipient: string; readonly subject: string }[]> =>
  select('SELECT recipient, subject FROM mails WHERE kind = :kind ORDER BY id', { kind });

/** Names of files in a folder of the data, at any depth. */
export async function filesIn(part: 'originals' | 'work'): Promise<readonly string[]> {
  const entries = await readdir(path.join(dataFolder, part), { recursive: true, withFileTypes: true }).catch(
    () => [],
  );
  return entries.filter((entry) => entry.isFile()).map(({ name }) => name);
}

export const originalBytes = (sha256: string): Buffer => readFileSync(originalPath(sha256));
