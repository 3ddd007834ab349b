import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Frame } from '@/lib/contracts/api/frame';
import type { Job } from '@/lib/contracts/api/job';
import type { MeasurementSet, Queued } from '@/lib/contracts/api/measurement-set';
import type { Night } from '@/lib/contracts/api/night';
import type { Problem } from '@/lib/contracts/api/problem';
import type { List } from '@/lib/contracts/common';
import type { z } from 'zod';
import { sessionCookieName } from '@/lib/server/identity/sessions';
import { startDatabaseServer, type DatabaseServer } from '../support/database-server';
import { migrateDatabase, seedDatabase } from '../support/scripts';
import { startApplication, type RunningApplication } from '../support/server';

const password = 'a demo password for a restart';
let server: DatabaseServer;
let dataFolder: string;
let application: RunningApplication;
let token: string;
let night: Night;

const call = (what: string, more: RequestInit = {}): Promise<Response> =>
  fetch(`${application.baseUrl}/api/v1${what}`, {
    ...more,
    headers: { authorization: `Bearer ${token}`, 'content-type': 'application/json', ...more.headers },
  });
/** What anybody is told, such as a monitor. */
const health = async (headers: Record<string, string> = {}): Promise<unknown> =>
  (await fetch(`${application.baseUrl}/api/v1/health`, { headers })).json();
const read = async <T>(what: string): Promise<T> => {
  const answer = await call(what);
  expect(answer.status, what).toBe(200);
  return (await answer.json()) as T;
};

beforeAll(async () => {
  server = await startDatabaseServer();
  dataFolder = await mkdtemp(path.join(tmpdir(), 'evenfall-data-'));
  const database = await server.createDatabase('evenfall_restart');
  const env = { EVENFALL_DEMO: '1', DEMO_PASSWORD: password, DATA_DIR: dataFolder };
  await migrateDatabase(database);
  await seedDatabase(database, env);
  application = await startApplication({ database, dataFolder, env });
  const made = await fetch(`${application.baseUrl}/api/v1/tokens`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ email: 'observer@evenfall.example', password, name: 'restart' }),
  });
  ({ token } = (await made.json()) as { token: string });
  const nights = await read<List<Night>>('/nights?from=2026-11-03&to=2026-11-03');
  if (!nights.items[0]) throw new Error('The demo has no night 2026-11-03.');
  night = nights.items[0];
}, 180_000);
afterAll(async () => {
  await application.stop();
  await server.dispose();
  await rm(dataFolder, { recursive: true, force: true });
}, 60_000);

async function expectOutage(answer: Response): Promise<void> {
  expect(answer.status).toBe(503);
  expect(answer.headers.get('content-type')).toContain('application/problem+json');
  expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(0);
  const problem = (await answer.json()) as z.infer<typeof Problem>;
  expect(problem).toMatchObject({ status: 503, errors: [] });
  expect(problem.detail).toContain('Nothing was changed');
}

describe('an application whose database goes away and comes back', () => {
  it('says so while it is away, and nothing of its inside', async () => {
    await server.halt();
    await expectOutage(await call('/nights'));
    await expectOutage(
      await call(`/nights/${night.id}/remarks`, { method: 'POST', body: JSON.stringify({ text: 'Lost?' }) }),
    );
    await expectOutage(
      await call(`/nights/${night.id}/measurements`, {
        method: 'POST',
        headers: { 'content-type': 'text/csv' },
        body: 'frame,star,inst_mag,inst_err\n1,A,-7,0.01\n',
      }),
    );
    const degraded = { status: 'degraded', database: 'unreachable' };
    expect(await health()).toMatchObject(degraded);
    // A monitor that is signed in, by token or by cookie, is told the same: who it is cannot be looked up now.
    expect(await read('/health')).toMatchObject(degraded);
    expect(await health({ cookie: `${sessionCookieName}=of-nobody` })).toMatchObject(degraded);
    for (const page of ['/sign-in', '/nights']) {
      const answer = await fetch(application.baseUrl + page, {
        headers: { cookie: `${sessionCookieName}=of-nobody` },
      });
      expect(answer.status, page).toBe(500);
      const text = await answer.text();
      // Under this number, which the person is shown, the log has the cause.
      expect(text, page).toMatch(/digest\W+\d+/);
      expect(text, page).not.toMatch(/sequelize|mariadb|ECONNREFUSED|SELECT |node_modules| at \w+ \(/);
      expect(text, page).not.toContain(String(server.port));
    }
  });

  it('answers again by itself when it is back, with its jobs, and nothing of what was refused', async () => {
    await server.resume();
    await expect.poll(async () => (await call('/nights')).status, { timeout: 20_000 }).toBe(200);
    expect(await health()).toMatchObject({ status: 'ok', database: 'ok' });
    const remarks = await read<List<{ text: string }>>(`/nights/${night.id}/remarks?limit=1000`);
    expect(remarks.items.map(({ text }) => text)).not.toContain('Lost?');

    const frames = await read<List<Frame>>(`/nights/${night.id}/frames?type=standard&limit=1`);
    const sent = await call(`/nights/${night.id}/measurements`, {
      method: 'POST',
      headers: { 'content-type': 'text/csv' },
      body: `frame,star,inst_mag,inst_err\n${frames.items[0]?.number ?? 0},98 185,-7,0.01\n`,
    });
    expect(sent.status).toBe(202);
    const { set, job } = (await sent.json()) as Queued;
    await expect
      .poll(async () => (await read<Job>(`/jobs/${job}`)).state, { timeout: 20_000, interval: 200 })
      .toBe('done');
    expect(await read<MeasurementSet>(`/measurement-sets/${set}`)).toMatchObject({
      state: 'matched',
      rows: 1,
      matched_rows: 1,
    });
    // The same process all the while.
    expect(application.child.process.exitCode).toBeNull();
  });
});
