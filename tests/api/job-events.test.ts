import { describe, expect, inject, it } from 'vitest';
import { cancelJob, getJobEvents, Job } from '@/lib/contracts/api/job';
import { personByEmail } from '@/lib/server/data/people';
import { newPublicId } from '@/lib/server/data/public-id';
import { callerOf } from '@/lib/server/identity/caller';
import type { NewJob } from '@/lib/server/jobs/enqueue';
import type { JobKind } from '@/lib/contracts/job-kinds';
import { callApi, demoToken } from '../support/api';
import { queueJob } from '../support/jobs';

const tidy = { kind: 'tidy', payload: {} } as const;
const later = (wait_ms: number): Date => new Date(Date.now() + wait_ms);

/** Queues a job of a demo account; the application that runs does it when it is due. */
async function queueOf<K extends JobKind>(account: string, job: NewJob<K>): Promise<string> {
  const person = await personByEmail(`${account}@evenfall.example`);
  const caller = person && (await callerOf(person.id, { via: 'session', requestId: 'test' }));
  if (!caller) throw new Error(`There is no ${account}.`);
  return queueJob(job, caller);
}

interface Told {
  readonly id: number;
  readonly event: string;
  readonly job: Job;
}

/** The events of a job, one by one as they come; the end of the iteration is the end of the stream. */
async function* follow(account: string, id: string): AsyncGenerator<Told, void, void> {
  const leaving = new AbortController();
  const answer = await fetch(`${inject('baseUrl')}/api/v1/jobs/${id}/events`, {
    headers: { authorization: `Bearer ${await demoToken(account)}` },
    signal: leaving.signal,
  });
  expect(answer.status).toBe(200);
  expect(answer.headers.get('content-type')).toContain('text/event-stream');
  expect(answer.headers.get('cache-control')).toContain('no-transform');
  if (!answer.body) throw new Error('The stream has no body.');
  let text = '';
  try {
    for await (const chunk of answer.body.pipeThrough(new TextDecoderStream())) {
      const blocks = (text + chunk).split('\n\n');
      text = blocks.pop() ?? '';
      for (const block of blocks) {
        const told = /^id: (\d+)\nevent: (\w+)\ndata: (.*)$/.exec(block);
        // What is left out is the time to wait before coming back, and the heartbeat.
        if (!told) expect(block).toMatch(/^(retry: \d+|: .*)$/);
        else yield { id: Number(told[1]), event: told[2] ?? '', job: Job.parse(JSON.parse(told[3] ?? '')) };
      }
    }
    expect(text).toBe('');
  } finally {
    leaving.abort();
  }
}

async function all(events: AsyncIterable<Told>): Promise<readonly Told[]> {
  const told: Told[] = [];
  for await (const event of events) told.push(event);
  return told;
}

describe('the events of a job', () => {
  it('begin with its present state at once, though nothing happens to it for an hour', async () => {
    const id = await queueOf('observer', { ...tidy, runAfter: later(3_600_000) });
    const begun = performance.now();
    for await (const { event, job } of follow('observer', id)) {
      expect({ event, id: job.id, state: job.state }).toEqual({ event: 'progress', id, state: 'queued' });
      break;
    }
    // Sooner than a heartbeat would push it out of a buffer.
    expect(performance.now() - begun).toBeLessThan(10_000);
  });

  it('tell that it is done, with its result, as the last before the stream ends', async () => {
    const id = await queueOf('observer', { ...tidy, runAfter: later(1500) });
    const told = await all(follow('observer', id));
    expect(told.map((each) => each.id)).toEqual(told.map((_, index) => index + 1));
    expect(told[0]).toMatchObject({ event: 'progress', job: { state: 'queued' } });
    expect(told.slice(0, -1).every(({ event }) => event === 'progress')).toBe(true);
    expect(told.at(-1)).toMatchObject({
      event: 'done',
      job: { state: 'done', progress: 1, result: { sessions: expect.any(Number) as number } },
    });
    expect(told.at(-1)?.job.finished_at).not.toBeNull();
  });

  it('are one event and the end when it has ended before', async () => {
    const id = await queueOf('observer', tidy);
    await all(follow('observer', id));
    expect((await all(follow('observer', id))).map(({ event }) => event)).toEqual(['done']);
  });

  it('tell that it has failed, and why', async () => {
    const id = await queueOf('observer', {
      kind: 'check-measurements',
      payload: { set: newPublicId() },
      runAfter: later(1000),
    });
    const told = await all(follow('observer', id));
    expect(told.at(-1)).toMatchObject({
      event: 'failed',
      job: { state: 'failed', error: { code: 'not-found', message: expect.any(String) as string } },
    });
  });

  it('tell everybody who follows it that somebody has cancelled it', async () => {
    const id = await queueOf('observer', { ...tidy, runAfter: later(3_600_000) });
    const following = [follow('observer', id), follow('manager', id)];
    for (const events of following) expect((await events.next()).value).toMatchObject({ event: 'progress' });
    expect((await callApi(cancelJob, { token: await demoToken('observer'), params: { id } })).status).toBe(
      200,
    );
    for (const events of following) {
      expect((await all(events)).at(-1)).toMatchObject({ event: 'cancelled', job: { state: 'cancelled' } });
    }
  });

  it.each(['photometrist', 'pi', 'coinvestigator'])(
    'are not found by %s, to whom another’s job is invisible, and the refusal is no stream',
    async (account) => {
      const id = await queueOf('observer', { ...tidy, runAfter: later(3_600_000) });
      const token = await demoToken(account);
      // Held to the document by the call: problem details, not events.
      expect((await callApi(getJobEvents, { token, params: { id } })).status).toBe(404);
      const none = await callApi(getJobEvents, { token, params: { id: newPublicId() } });
      expect(none.status).toBe(404);
    },
  );
});
