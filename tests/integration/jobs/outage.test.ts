import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase } from '@/db/connection';
import { logger } from '@/lib/server/log/logger';
import { startDatabaseServer, type DatabaseServer } from '@/tests/support/database-server';
import { databaseEnvironment } from '@/tests/support/environment';
import { checkResult, jobNow, queueCheck, untilJob } from '@/tests/support/jobs';
import { migrateDatabase } from '@/tests/support/scripts';
import { startRunner, type Runner } from '@/workers/runner';

// A MariaDB of this file's own: it is stopped and started under the runner.
let server: DatabaseServer;
let runner: Runner;
const said: string[] = [];
let finish: () => void = () => undefined;

beforeAll(async () => {
  server = await startDatabaseServer();
  const address = await server.createDatabase('evenfall_outage');
  await migrateDatabase(address);
  await closeDatabase();
  Object.assign(process.env, databaseEnvironment(address));
  const log = logger();
  const listen = (_: unknown, text: string): void => void said.push(text);
  log.warn = listen as unknown as typeof log.warn;
  log.info = listen as unknown as typeof log.info;
  runner = startRunner({
    concurrency: 1,
    poll_ms: 50,
    keep_ms: 50,
    handlers: {
      'check-measurements': () =>
        Promise.resolve(async ({ payload }) => {
          await new Promise<void>((resolve) => (finish = resolve));
          return checkResult(payload.set);
        }),
    },
  });
});
afterAll(async () => {
  await runner.stop(0);
  await closeDatabase();
  await server.dispose();
});

describe('a restart of MariaDB under a running runner', () => {
  it('is outlived: the job under way is recorded, the next one is done, and the outage is said once', async () => {
    const first = await queueCheck();
    await untilJob(first, 'running');
    await server.halt();
    // The work ends while there is no database to tell.
    finish();
    await new Promise((resolve) => setTimeout(resolve, 1_500));
    await server.resume();
    expect(await untilJob(first, 'done')).toMatchObject({ tries: 1 });

    const second = await queueCheck();
    await untilJob(second, 'running');
    finish();
    await untilJob(second, 'done');
    expect((await jobNow(second)).tries).toBe(1);
    expect(said.filter((text) => text.includes('not reachable'))).toHaveLength(1);
    expect(said.filter((text) => text.endsWith(': back'))).toHaveLength(1);
  }, 60_000);
});
