import { openAsBlob } from 'node:fs';
import { rm } from 'node:fs/promises';
import path from 'node:path';
import { addressFromEnvironment } from '@/db/connection';
import type { Queued } from '@/lib/contracts/api/measurement-set';
import { selectOne } from '@/lib/server/data/database';
import { startApplication } from '@/tests/support/server';
import type { Bench, Figure } from './bench';
import { benchNight, forgetSet, sessionCookie } from './bench-night';
import { million, writeTable } from './write-table';

/** A reader asks for the next page so long after the one before [ms]. */
const pause_ms = 25;
const samplesIdle = 400;
const warmUps = 60;
/** One after the other: while one is taken there is time for a hundred pages, too few for a hundredth of them. */
const tables = 4;

/** How long signed-in pages take from the built application, idle and while the same process takes a large table. */
export const latency: Bench = {
  name: 'latency',
  run: async (world) => {
    const night = await benchNight();
    const file = path.join(world.folder, 'million.csv');
    await writeTable(file, million);
    const database = addressFromEnvironment();
    const application = await startApplication({ database, dataFolder: world.folder });
    try {
      const reader: Reader = {
        baseUrl: application.baseUrl,
        cookie: await sessionCookie(night.caller),
        pages: ['/nights', `/nights/${night.id}`, `/nights/${night.id}/measurements`],
      };
      await readWhile(reader, (count) => count < warmUps);
      const idle = await readWhile(reader, (count) => count < samplesIdle);
      const busy: number[] = [];
      for (let table = 1; table <= tables; table += 1)
        busy.push(...(await readDuringUpload(reader, night.id, file)));
      return figures(idle, busy);
    } finally {
      await application.stop();
      await rm(file);
    }
  },
};

interface Reader {
  readonly baseUrl: string;
  readonly cookie: string;
  readonly pages: readonly string[];
}

/** Reads the pages in turn, and tells how long each answer took to its last byte [ms]. */
async function readWhile(reader: Reader, goesOn: (count: number) => boolean): Promise<readonly number[]> {
  const taken_ms: number[] = [];
  while (goesOn(taken_ms.length)) {
    const page = reader.pages[taken_ms.length % reader.pages.length] ?? '/';
    const begun_ms = performance.now();
    const answer = await fetch(reader.baseUrl + page, {
      headers: { cookie: reader.cookie },
      redirect: 'manual',
    });
    await answer.arrayBuffer();
    taken_ms.push(performance.now() - begun_ms);
    if (answer.status !== 200) throw new Error(`${page} answered ${answer.status}.`);
    await new Promise((resolve) => setTimeout(resolve, pause_ms));
  }
  return taken_ms;
}

/** Reads the pages for as long as the server takes a table, which is removed again. */
async function readDuringUpload(reader: Reader, night: string, file: string): Promise<readonly number[]> {
  let isOver = false;
  const upload = uploadOverHttp(reader, night, file).finally(() => (isOver = true));
  const [set, samples] = await Promise.all([upload, readWhile(reader, () => !isOver)]);
  await forgetSet(set);
  return samples;
}

/** Sends the table as a browser does and waits until its job has matched it; gives the set. */
async function uploadOverHttp({ baseUrl, cookie }: Reader, night: string, file: string): Promise<string> {
  const answer = await fetch(`${baseUrl}/api/v1/nights/${night}/measurements?kind=standard`, {
    method: 'POST',
    headers: { cookie, origin: baseUrl, 'content-type': 'text/csv' },
    body: await openAsBlob(file, { type: 'text/csv' }),
  });
  if (answer.status !== 202) throw new Error(`The upload answered ${answer.status}: ${await answer.text()}`);
  const { set, job } = (await answer.json()) as Queued;
  for (;;) {
    const now = await selectOne<{ state: string }>('SELECT state FROM jobs WHERE public_id = :job', { job });
    if (now?.state === 'done') break;
    if (now?.state !== 'queued' && now?.state !== 'running') throw new Error(`The check is ${now?.state}.`);
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  const state = await selectOne<{ state: string }>(
    'SELECT state FROM measurement_sets WHERE public_id = :set',
    { set },
  );
  if (state?.state !== 'matched') throw new Error(`The set is ${state?.state}.`);
  return set;
}

/** The value that a hundredth of the samples lies above; nearest rank, common practice. */
function percentile(samples: readonly number[], share: number): number {
  const sorted = samples.toSorted((a, b) => a - b);
  return sorted[Math.ceil(share * sorted.length) - 1] ?? Number.NaN;
}

function figures(idle: readonly number[], busy: readonly number[]): readonly Figure[] {
  const during = `while 1,000,000 rows are taken (${busy.length} pages)`;
  const row = (name: string, share: number, aim: number | null): Figure => ({
    name,
    measured: percentile(busy, share),
    baseline: percentile(idle, share),
    unit: 'ms',
    aim,
  });
  return [
    row(`page, 99th percentile, ${during}, against idle`, 0.99, 3),
    row('page, median, likewise', 0.5, null),
  ];
}
