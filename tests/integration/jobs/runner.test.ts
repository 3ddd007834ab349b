import { afterEach, describe, expect, it } from 'vitest';
import { Fault } from '@/lib/faults/fault';
import type { Handler } from '@/workers/handler';
import { startRunner, type Runner, type RunnerOptions } from '@/workers/runner';
import { checkResult, jobNow, makeDue, queueCheck, untilJob } from '@/tests/support/jobs';

const runners: Runner[] = [];
function run(handler: Handler<'check-measurements'>, options: Partial<RunnerOptions> = {}): Runner {
  const runner = startRunner({
    handlers: { 'check-measurements': () => Promise.resolve(handler) },
    concurrency: 2,
    poll_ms: 50,
    keep_ms: 50,
    ...options,
  });
  runners.push(runner);
  return runner;
}
afterEach(async () => {
  await Promise.all(runners.splice(0).map((runner) => runner.stop(0)));
});

const untilAborted = (signal: AbortSignal): Promise<never> =>
  new Promise((_, reject) => signal.addEventListener('abort', () => reject(signal.reason as Error)));

describe('a runner', () => {
  it('does a job and keeps its result', async () => {
    const id = await queueCheck();
    run(({ payload, progress }) => {
      progress(0.5, 'half way');
      return Promise.resolve({ ...checkResult(payload.set), rows: 7 });
    });
    const job = await untilJob(id, 'done');
    expect(job).toMatchObject({
      tries: 1,
      progress: 1,
      result: { state: 'matched', rows: 7 },
      error: null,
      owner: null,
    });
  });

  it('begins a job that is queued in its own process at once, not at the next poll', async () => {
    run(({ payload }) => Promise.resolve(checkResult(payload.set)), { poll_ms: 60_000 });
    await new Promise((resolve) => setTimeout(resolve, 300));
    expect(await untilJob(await queueCheck(), 'done', 2_000)).toMatchObject({ tries: 1 });
  });

  it('shows progress while it works', async () => {
    const id = await queueCheck();
    let go: () => void = () => undefined;
    run(async ({ payload, progress }) => {
      progress(0.25, 'rows 1 to 10');
      await new Promise<void>((resolve) => (go = resolve));
      return checkResult(payload.set);
    });
    await expect
      .poll(() => jobNow(id), { timeout: 5_000 })
      .toMatchObject({ state: 'running', progress: 0.25, message: 'rows 1 to 10' });
    go();
    expect((await untilJob(id, 'done')).progress).toBe(1);
  });

  it('never shares a job with another runner', async () => {
    const begun: string[] = [];
    const ids: string[] = [];
    for (let n = 0; n < 60; n += 1) ids.push(await queueCheck());
    const handler: Handler<'check-measurements'> = async ({ id, payload }) => {
      begun.push(id);
      await new Promise((resolve) => setTimeout(resolve, 5));
      return checkResult(payload.set);
    };
    for (let n = 0; n < 4; n += 1) run(handler, { poll_ms: 5 });
    for (const id of ids) await untilJob(id, 'done');
    expect(begun.toSorted()).toEqual(ids.toSorted());
  });

  it('tries again after an error, later each time, and fails when the tries are used up', async () => {
    const id = await queueCheck();
    run(() => Promise.reject(new Error('secret: hunter2')));
    for (const [tries, least_s, most_s] of [
      [1, 3.5, 6],
      [2, 7.5, 12],
    ] as const) {
      await expect.poll(() => jobNow(id)).toMatchObject({ state: 'queued', tries });
      const { wait_s } = await jobNow(id);
      expect(wait_s).toBeGreaterThan(least_s);
      expect(wait_s).toBeLessThan(most_s);
      await makeDue(id);
    }
    const job = await untilJob(id, 'failed');
    expect(job.tries).toBe(3);
    expect(job.error).toMatchObject({
      code: 'bug',
      reference: expect.stringMatching(/^[0-9a-f-]{36}$/) as string,
    });
    expect(JSON.stringify(job.error)).not.toContain('hunter2');
  });

  it('does not try again what a rule refused', async () => {
    const id = await queueCheck();
    run(() => Promise.reject(new Fault('conflict', 'The set was removed.')));
    const job = await untilJob(id, 'failed');
    expect(job).toMatchObject({ tries: 1, error: { code: 'conflict', message: 'The set was removed.' } });
  });

  it('treats a result that breaks the contract as an error', async () => {
    const id = await queueCheck();
    run(() => Promise.resolve({ nonsense: true } as never));
    await expect.poll(() => jobNow(id)).toMatchObject({ state: 'queued', tries: 1, error: { code: 'bug' } });
  });

  it('takes up a job whose runner was lost, and the lost one’s result counts for nothing', async () => {
    const id = await queueCheck();
    let finishLate: () => void = () => undefined;
    // This runner never extends its lease, as if its process had been stopped.
    run(
      async ({ payload }) => {
        await new Promise<void>((resolve) => (finishLate = resolve));
        return { ...checkResult(payload.set), rows: 1 };
      },
      { lease_s: 1, keep_ms: 3_600_000, concurrency: 1 },
    );
    await untilJob(id, 'running');
    run(({ payload }) => Promise.resolve({ ...checkResult(payload.set), rows: 2 }), { lease_s: 1 });
    expect(await untilJob(id, 'done')).toMatchObject({ tries: 2, result: { rows: 2 } });
    finishLate();
    await new Promise((resolve) => setTimeout(resolve, 200));
    expect(await jobNow(id)).toMatchObject({ state: 'done', result: { rows: 2 } });
  });

  it('keeps a lease for as long as the work lasts', async () => {
    const id = await queueCheck();
    const begun: string[] = [];
    const handler: Handler<'check-measurements'> = async ({ payload, id: job }) => {
      begun.push(job);
      await new Promise((resolve) => setTimeout(resolve, 2_500));
      return checkResult(payload.set);
    };
    run(handler, { lease_s: 1 });
    run(handler, { lease_s: 1 });
    await untilJob(id, 'done');
    expect(begun).toEqual([id]);
  });

  it('gives its jobs back when it stops, and another takes them at once without losing a try', async () => {
    const id = await queueCheck();
    const first = run(({ signal }) => untilAborted(signal), { lease_s: 600 });
    await untilJob(id, 'running');
    await first.stop(50);
    expect(await jobNow(id)).toMatchObject({ state: 'queued', tries: 0, owner: null, error: null });
    run(({ payload }) => Promise.resolve(checkResult(payload.set)));
    expect(await untilJob(id, 'done', 2_000)).toMatchObject({ tries: 1 });
  });

  it('gives even those jobs back that do not notice the stop', async () => {
    const id = await queueCheck();
    const first = run(() => new Promise(() => undefined), { lease_s: 600 });
    await untilJob(id, 'running');
    await first.stop(0);
    expect(await jobNow(id)).toMatchObject({ state: 'queued', tries: 0 });
  });

  it('lets a running job come to its end within the grace of a stop', async () => {
    const id = await queueCheck();
    const runner = run(async ({ payload }) => {
      await new Promise((resolve) => setTimeout(resolve, 400));
      return checkResult(payload.set);
    });
    await untilJob(id, 'running');
    await runner.stop(5_000);
    expect((await jobNow(id)).state).toBe('done');
  });

  it('fails a job whose process died at every try', async () => {
    const id = await queueCheck();
    const dying = () =>
      run(({ signal }) => untilAborted(signal), { lease_s: 0.3, keep_ms: 3_600_000, concurrency: 1 });
    // Each of these holds the job until its lease is over and then loses it to the next.
    for (let n = 0; n < 4; n += 1) dying();
    const job = await untilJob(id, 'failed');
    expect(job).toMatchObject({ tries: 3, error: { code: 'died' } });
  });
});
