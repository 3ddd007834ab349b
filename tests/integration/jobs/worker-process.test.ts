import { beforeEach, describe, expect, it } from 'vitest';
import { type Child } from '@/tests/support/child';
import { emptyTables } from '@/tests/support/database';
import { jobNow, queueCheck, untilJob } from '@/tests/support/jobs';
import { startWorker } from '@/tests/support/worker';

const start = (env: Readonly<Record<string, string>>): Child =>
  startWorker('tests/support/slow-worker.ts', { LOG_LEVEL: 'info', ...env });
beforeEach(emptyTables);

describe('a worker process', () => {
  it('that is killed in mid-job loses it: the job is taken up after the lease and finished once', async () => {
    const id = await queueCheck();
    const first = start({ SLOW_MS: '60000', LEASE_S: '1' });
    await untilJob(id, 'running', 15_000);
    await expect
      .poll(() => jobNow(id), { timeout: 5_000 })
      .toMatchObject({ message: `process ${first.process.pid}` });
    first.process.kill('SIGKILL');
    await first.ended;
    expect(await jobNow(id)).toMatchObject({ state: 'running', tries: 1 });

    const second = start({ SLOW_MS: '100', LEASE_S: '5' });
    const job = await untilJob(id, 'done', 15_000);
    expect(job).toMatchObject({ tries: 2, result: { rows: second.process.pid } });
  });

  it('that is asked to stop gives its job back at once and ends with code 0', async () => {
    const id = await queueCheck();
    const child = start({ SLOW_MS: '60000', LEASE_S: '600' });
    await untilJob(id, 'running', 15_000);
    child.process.kill('SIGTERM');
    expect(await child.ended).toBe(0);
    expect(await jobNow(id)).toMatchObject({ state: 'queued', tries: 0, owner: null });
  });

  it('ends at once at the second signal', async () => {
    const id = await queueCheck();
    const child = start({ SLOW_MS: '60000', LEASE_S: '600' });
    await untilJob(id, 'running', 15_000);
    child.process.kill('SIGINT');
    await expect.poll(child.output, { timeout: 5_000 }).toContain('"stopping"');
    child.process.kill('SIGINT');
    expect(await child.ended).toBe(1);
  });
});
