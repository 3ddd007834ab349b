import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { cancelJob } from '@/lib/server/acts/cancel-job';
import { retryJob } from '@/lib/server/acts/retry-job';
import { execute, inTransaction, insert, select } from '@/lib/server/data/database';
import { enqueue } from '@/lib/server/jobs/enqueue';
import { scheduleTidy } from '@/lib/server/jobs/schedule-tidy';
import { postMail } from '@/lib/server/mail/post-mail';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { readJob } from '@/lib/server/reads/job';
import { readJobCounts, readJobs } from '@/lib/server/reads/jobs';
import { emptyTables } from '@/tests/support/database';
import {
  checkResult,
  jobNow,
  makePerson,
  queueCheck,
  queueJob,
  system,
  untilJob,
} from '@/tests/support/jobs';
import type { Handler } from '@/workers/handler';
import { handlers } from '@/workers/handlers';
import { startRunner, type Runner } from '@/workers/runner';

const runners: Runner[] = [];
function run(handler: Handler<'check-measurements'>): void {
  const every = { 'check-measurements': () => Promise.resolve(handler) };
  runners.push(startRunner({ handlers: every, concurrency: 2, poll_ms: 50, keep_ms: 60_000 }));
}
const waiting: Handler<'check-measurements'> = ({ signal }) =>
  new Promise((_, reject) => signal.addEventListener('abort', () => reject(signal.reason as Error)));

let manager: PersonCaller;
let observer: PersonCaller;
let other: PersonCaller;
beforeEach(async () => {
  await emptyTables();
  manager = await makePerson('Imogen Tarrant', 'manager');
  observer = await makePerson('Noor Hathaway', 'observer');
  other = await makePerson('Bram Oyelaran', 'photometrist');
});
afterEach(async () => {
  await Promise.all(runners.splice(0).map((runner) => runner.stop(0)));
});

const audit = () =>
  select<{ act: string; person: number }>('SELECT act, person_id AS person FROM audit_events');
const fault = (code: string) => expect.objectContaining({ name: 'Fault', code }) as Error;

describe('queuing', () => {
  const payload = { set: '3kq8v7m2t0xc' };
  const job = { kind: 'check-measurements', payload, dedupeKey: 'check:3kq8v7m2t0xc' } as const;

  it('makes one job for a key while it lives, also when asked at the same time', async () => {
    const ids = await Promise.all([queueJob(job), queueJob(job), queueJob(job)]);
    expect(new Set(ids).size).toBe(1);
    expect(await queueJob(job)).toBe(ids[0]);
  });

  it('makes a new job for the key of one that has ended', async () => {
    const first = await queueJob(job);
    run(({ payload: { set } }) => Promise.resolve(checkResult(set)));
    await untilJob(first, 'done');
    const second = await queueJob(job);
    expect(second).not.toBe(first);
    expect((await untilJob(second, 'done')).dedupeKey).toBe(`check:3kq8v7m2t0xc#${second}`);
  });

  it('leaves nothing behind when the change that causes it is undone', async () => {
    const undone = inTransaction(async (tx) => {
      await enqueue(tx, system, job);
      throw new Error('the change failed');
    });
    await expect(undone).rejects.toThrow('the change failed');
    expect(await select('SELECT id FROM jobs')).toEqual([]);
  });

  it('does not begin before its time', async () => {
    const id = await queueJob({ ...job, runAfter: new Date(Date.now() + 3_600_000) });
    run(({ payload: { set } }) => Promise.resolve(checkResult(set)));
    await new Promise((resolve) => setTimeout(resolve, 300));
    expect(await jobNow(id)).toMatchObject({ state: 'queued', tries: 0 });
    expect((await jobNow(id)).wait_s).toBeGreaterThan(3_590);
  });

  it('refuses a payload that breaks the contract', async () => {
    await expect(queueJob({ ...job, payload: { set: 'no id' } })).rejects.toThrow(/is not an id/);
  });
});

describe('cancelling', () => {
  it('ends a queued job at once, with an audit row', async () => {
    const id = await queueCheck(observer);
    await cancelJob(observer, id);
    expect(await jobNow(id)).toMatchObject({ state: 'cancelled', tries: 0 });
    expect(await audit()).toEqual([{ act: 'job.cancel', person: observer.personId }]);
  });

  it('stops a running job without waiting for the next look', async () => {
    const id = await queueCheck(observer);
    run(waiting);
    await untilJob(id, 'running');
    await cancelJob(manager, id);
    expect(await untilJob(id, 'cancelled', 2_000)).toMatchObject({ error: null });
  });

  it('lets work that is done before it notices be done', async () => {
    const id = await queueCheck(observer);
    let finish: () => void = () => undefined;
    run(async ({ payload }) => {
      await new Promise<void>((resolve) => (finish = resolve));
      return checkResult(payload.set);
    });
    await untilJob(id, 'running');
    await cancelJob(observer, id);
    finish();
    expect((await untilJob(id, 'done')).error).toBeNull();
  });

  it('refuses a job that has ended, as a conflict', async () => {
    const id = await queueCheck(observer);
    await cancelJob(observer, id);
    await expect(cancelJob(observer, id)).rejects.toEqual(fault('conflict'));
    expect(await audit()).toHaveLength(1);
  });

  it('lets one of two people win who cancel a queued job at once', async () => {
    const id = await queueCheck(observer);
    const outcomes = await Promise.allSettled([cancelJob(observer, id), cancelJob(manager, id)]);
    expect(outcomes.map(({ status }) => status).toSorted()).toEqual(['fulfilled', 'rejected']);
    expect(await audit()).toHaveLength(1);
  });

  it('does not tell others that the job exists', async () => {
    const id = await queueCheck(observer);
    await expect(cancelJob(other, id)).rejects.toEqual(fault('not-found'));
    expect((await jobNow(id)).state).toBe('queued');
  });

  it('is refused to those who may only see it', async () => {
    const programmeId = await insert(
      `INSERT INTO programmes (public_id, code, title, summary) VALUES ('programme001', 'MH26B-04', 'Thistle 3', '')`,
      {},
      null,
    );
    const id = await queueJob(
      { kind: 'check-measurements', payload: { set: '3kq8v7m2t0xc' }, programmeId },
      observer,
    );
    const investigator = { ...other, programmes: new Map([[programmeId, 'pi'] as const]) };
    expect((await readJob(investigator, id)).may_cancel).toBe(false);
    await expect(cancelJob(investigator, id)).rejects.toEqual(fault('not-allowed'));
  });

  it('of a mail’s sending marks the mail as failed, and a retry brings both back', async () => {
    await inTransaction((tx) =>
      postMail(tx, {
        kind: 'upload-refused',
        dedupeKey: 'x',
        to: { personId: null, email: 'observer@evenfall.example', name: 'Noor' },
        subject: 's',
        text: 't',
        html: 'h',
      }),
    );
    const [job] = await select<{ id: string }>('SELECT public_id AS id FROM jobs');
    const id = job?.id ?? '';
    await cancelJob(manager, id);
    const mail = () =>
      select<{ state: string; error: string }>('SELECT state, last_error AS error FROM mails');
    expect(await mail()).toEqual([{ state: 'failed', error: 'Cancelled by Imogen Tarrant.' }]);
    await execute(`UPDATE jobs SET state = 'failed'`, {}, null);
    await retryJob(manager, id);
    expect(await mail()).toEqual([{ state: 'queued', error: '' }]);
    expect((await jobNow(id)).dedupeKey).toMatch(/^send-mail:[0-9a-z]{12}$/);
  });
});

describe('trying a failed job again', () => {
  async function failed(dedupeKey?: string): Promise<string> {
    const payload = { set: '3kq8v7m2t0xc' };
    const id = await queueJob(
      { kind: 'check-measurements', payload, ...(dedupeKey ? { dedupeKey } : {}) },
      observer,
    );
    await execute(
      `UPDATE jobs SET state = 'failed', tries = 3, error = '{"code":"bug","message":"m"}', finished_at = NOW(3),
              dedupe_key = CONCAT(dedupe_key, '#', public_id) WHERE public_id = :id`,
      { id },
      null,
    );
    return id;
  }

  it('queues it with all its tries, and is recorded', async () => {
    const id = await failed();
    await retryJob(manager, id);
    expect(await jobNow(id)).toMatchObject({ state: 'queued', tries: 0, error: null });
    expect(await audit()).toEqual([{ act: 'job.retry', person: manager.personId }]);
  });

  it('is the managers’ right', async () => {
    await expect(retryJob(observer, await failed())).rejects.toEqual(fault('not-allowed'));
  });

  it('is refused while a newer job does the same', async () => {
    const id = await failed('check:a');
    await queueJob({ kind: 'check-measurements', payload: { set: '3kq8v7m2t0xc' }, dedupeKey: 'check:a' });
    await expect(retryJob(manager, id)).rejects.toEqual(fault('conflict'));
    expect((await jobNow(id)).state).toBe('failed');
  });

  it('is refused for a job that has not failed', async () => {
    await expect(retryJob(manager, await queueCheck(observer))).rejects.toEqual(fault('conflict'));
  });
});

describe('the list of jobs', () => {
  it('shows managers all jobs and others their own', async () => {
    const mine = await queueCheck(observer);
    const theirs = await queueCheck(other);
    const ids = async (caller: PersonCaller) =>
      (await readJobs(caller, { limit: 10 })).items.map(({ id }) => id);
    expect(await ids(manager)).toEqual([theirs, mine]);
    expect(await ids(observer)).toEqual([mine]);
    expect(await ids(other)).toEqual([theirs]);
    expect(await readJobCounts(observer)).toMatchObject({ queued: 1, done: 0 });
  });

  it('pages by cursor, by state and by kind', async () => {
    const ids: string[] = [];
    for (let n = 0; n < 5; n += 1) ids.unshift(await queueCheck(observer));
    await cancelJob(observer, ids[4] ?? '');
    const first = await readJobs(manager, { limit: 2 });
    const second = await readJobs(manager, { limit: 2, after: first.next ?? '' });
    const third = await readJobs(manager, { limit: 2, after: second.next ?? '' });
    expect([first, second, third].flatMap(({ items }) => items.map(({ id }) => id))).toEqual(ids);
    expect(third.next).toBeNull();
    expect((await readJobs(manager, { limit: 10, state: 'cancelled' })).items.map(({ id }) => id)).toEqual([
      ids[4],
    ]);
    expect((await readJobs(manager, { limit: 10, kind: 'tidy' })).items).toEqual([]);
  });

  it('refuses a cursor that is not one of its own', async () => {
    await expect(readJobs(manager, { limit: 2, after: 'zzzzzzzzzzzz' })).rejects.toEqual(
      fault('invalid-input'),
    );
  });
});

describe('tidying', () => {
  it('is queued once an hour however many runners ask, and removes what has expired only', async () => {
    await execute(
      `INSERT INTO sessions (id, person_id, expires_at) VALUES
         ('${'a'.repeat(64)}', :id, NOW(3) - INTERVAL 1 MINUTE), ('${'b'.repeat(64)}', :id, NOW(3) + INTERVAL 1 DAY)`,
      { id: observer.personId },
      null,
    );
    await Promise.all([scheduleTidy(), scheduleTidy(), scheduleTidy()]);
    const jobs = await select<{ id: string }>(`SELECT public_id AS id FROM jobs WHERE kind = 'tidy'`);
    expect(jobs).toHaveLength(1);
    runners.push(startRunner({ handlers, concurrency: 1, poll_ms: 50 }));
    expect((await untilJob(jobs[0]?.id ?? '', 'done')).result).toMatchObject({ sessions: 1 });
    expect(await select('SELECT id FROM sessions')).toEqual([{ id: 'b'.repeat(64) }]);
    await scheduleTidy();
    expect(await select(`SELECT id FROM jobs WHERE kind = 'tidy'`)).toHaveLength(1);
  });
});
