import { setTimeout as pause } from 'node:timers/promises';
import type { Response } from 'supertest';
import { beforeAll, describe, expect, inject, it } from 'vitest';
import request from 'supertest';
import { logFrames, listFrames, type Frame } from '@/lib/contracts/api/frame';
import { getJob, listJobs, type Job } from '@/lib/contracts/api/job';
import type { Queued } from '@/lib/contracts/api/measurement-set';
import { openNight, patchNight, type Night } from '@/lib/contracts/api/night';
import {
  addSolutionComment,
  approveSolution,
  changeExclusions,
  getSolution,
  listResiduals,
  listSolutionComments,
  listSolutions,
  proposeSolution,
  solveNight,
  transformAgain,
  withdrawSolution,
  type QueuedSolution,
  type QueuedTransformation,
  type Solution,
  type SolutionComment,
  type SolutionObservation,
} from '@/lib/contracts/api/solution';
import { listStandards, type Standard } from '@/lib/contracts/api/standard';
import type { List } from '@/lib/contracts/common';
import { execute } from '@/lib/server/data/database';
import { callApi, demoToken } from '@/tests/support/api';

let observer: string;
let photometrist: string;
let second: string;
let pi: string;
let night: Night;
/** Far from the demo's nights and from those of other tests. */
const date = '2031-11-03';
const bodyOf = <T>(answer: Response): T => answer.body as T;

/** A closed night with a field of standards at five hours and one target, in V. */
beforeAll(async () => {
  observer = await demoToken('observer');
  photometrist = await demoToken('photometrist');
  second = await demoToken('photometrist2');
  pi = await demoToken('pi');
  night = bodyOf<Night>(await callApi(openNight, { token: observer, body: { telescope: 'larkspur', date } }));
  const params = { id: night.id };
  const frames = ['00:30', '01:30', '02:30', '03:30', '04:30'].map((time) => ({
    type: 'standard',
    object: 'SA 98',
    field: 'SA 98',
    band: 'V',
    utc_start: `2031-11-04T${time}:00Z`,
    exposure: 30,
  }));
  const target = {
    type: 'target',
    object: 'A field of nobody',
    ra: 83.5,
    dec: 22.1,
    band: 'V',
    exposure: 60,
  };
  const body = [...frames, { ...target, utc_start: '2031-11-04T02:00:00Z' }];
  await callApi(logFrames, { token: observer, params, body });
  const logged = bodyOf<List<Frame>>(await callApi(listFrames, { token: observer, params })).items;
  const stars = bodyOf<List<Standard>>(
    await callApi(listStandards, { token: observer, query: { field: 'SA 98' } }),
  ).items.slice(0, 20);
  const standards = logged.filter(({ type }) => type === 'standard');
  const rows = standards.flatMap(({ number, airmass }) =>
    stars.map(({ name, V, BV }, place) => {
      const measured = V - 20 + 0.15 * (airmass ?? 1) - 0.04 * BV + 0.003 * Math.sin(number * 31 + place * 7);
      return `${number},${name},${measured.toFixed(4)},0.004`;
    }),
  );
  await upload('standard', `frame,star,inst_mag,inst_err\n${rows.join('\n')}\n`);
  const number = logged.find(({ type }) => type === 'target')?.number ?? 0;
  await upload('target', `frame,star,ra,dec,inst_mag,inst_err\n${number},T 1,83.5,22.1,-7.3,0.01\n`);
  await callApi(patchNight, { token: observer, params, body: { state: 'closed' } });
}, 60_000);

async function upload(kind: string, table: string): Promise<void> {
  const answer = await request(inject('baseUrl'))
    .post(`/api/v1/nights/${night.id}/measurements`)
    .query({ kind })
    .set('authorization', `Bearer ${observer}`)
    .set('content-type', 'text/csv')
    .send(table);
  await untilDone(bodyOf<Queued>(answer).job, observer);
}

async function untilDone(id: string, token: string): Promise<Job> {
  const end = Date.now() + 60_000;
  for (;;) {
    const job = bodyOf<Job>(await callApi(getJob, { token, params: { id } }));
    if (job.state === 'done') return job;
    if (job.state === 'failed' || Date.now() > end)
      throw new Error(`The job ended as ${JSON.stringify(job)}`);
    await pause(100);
  }
}

async function solved(token: string, options: object = {}): Promise<Solution> {
  const answer = await callApi(solveNight, { token, params: { id: night.id }, body: options });
  expect(answer.status, answer.text).toBe(202);
  const { solution, job } = bodyOf<QueuedSolution>(answer);
  expect(await untilDone(job, token)).toMatchObject({ kind: 'solve-night', result: { solution } });
  return bodyOf<Solution>(await callApi(getSolution, { token, params: { id: solution } }));
}

/** The approval has its targets transformed; when that has not come to its end, it can be asked for again. */
async function transformAnew(solution: string): Promise<void> {
  const query = { kind: 'transform-targets' };
  const jobs = bodyOf<List<Job>>(await callApi(listJobs, { token: second, query })).items;
  await untilDone(jobs.find((job) => job.solution === solution)?.id ?? '', second);
  const params = { id: solution };
  const made = await callApi(transformAgain, { token: photometrist, params });
  expect(made.status, made.text).toBe(409);
  // As a job leaves it that was cancelled before its end.
  await execute(
    `UPDATE transformations SET state = 'queued', finished_at = NULL
      WHERE solution_id = (SELECT id FROM solutions WHERE public_id = :solution)`,
    { solution },
    null,
  );
  await execute(
    `DELETE FROM calibrated_magnitudes WHERE transformation_id IN
       (SELECT t.id FROM transformations t JOIN solutions s ON s.id = t.solution_id WHERE s.public_id = :solution)`,
    { solution },
    null,
  );
  expect((await callApi(transformAgain, { token: observer, params })).status).toBe(403);
  expect((await callApi(transformAgain, { token: pi, params })).status).toBe(404);
  const again = await callApi(transformAgain, { token: photometrist, params });
  expect(again.status, again.text).toBe(202);
  expect(await untilDone(bodyOf<QueuedTransformation>(again).job, photometrist)).toMatchObject({
    kind: 'transform-targets',
    solution,
    result: { outcome: 'stored', stars: 1 },
  });
}

describe('a night over HTTP', { timeout: 120_000 }, () => {
  it('is solved by its observer, and its coefficients, covariance and residuals can be read', async () => {
    const solution = await solved(observer);
    expect(solution).toMatchObject({ state: 'draft', outcome: 'determined', n_observations: 100 });
    const extinction = solution.bands.V?.coefficients.find(({ name }) => name === 'extinction');
    expect(Math.abs((extinction?.value ?? NaN) - 0.15)).toBeLessThan(0.03);
    const listed = await callApi(listSolutions, { token: observer, params: { id: night.id } });
    expect(bodyOf<List<Solution>>(listed).items.map(({ id }) => id)).toContain(solution.id);
    const params = { id: solution.id };
    const page = bodyOf<List<SolutionObservation>>(
      await callApi(listResiduals, { token: observer, params, query: { limit: 60, band: 'V' } }),
    );
    expect(page.items).toHaveLength(60);
    expect(page.next).not.toBeNull();
  });

  it('is proposed by one photometrist, refused to the same, approved by another, and withdrawn', async () => {
    const first = await solved(photometrist);
    const rows = bodyOf<List<SolutionObservation>>(
      await callApi(listResiduals, { token: photometrist, params: { id: first.id } }),
    ).items;
    const changed = await callApi(changeExclusions, {
      token: photometrist,
      params: { id: first.id },
      body: { observations: [rows[0]?.observation], reason: 'a satellite' },
    });
    expect(changed.status, changed.text).toBe(202);
    const { solution: id, job } = bodyOf<QueuedSolution>(changed);
    await untilDone(job, photometrist);
    const params = { id };
    const comment = await callApi(addSolutionComment, {
      token: observer,
      params,
      body: { text: 'Thin cloud at 2 h.' },
    });
    expect(bodyOf<SolutionComment>(comment)).toMatchObject({ act: 'comment', text: 'Thin cloud at 2 h.' });
    const early = await callApi(approveSolution, { token: second, params, body: {} });
    expect(early.status).toBe(409);
    const proposed = await callApi(proposeSolution, {
      token: photometrist,
      params,
      body: { verdict: 'photometric', comment: 'Looks good.' },
    });
    expect(bodyOf<Solution>(proposed)).toMatchObject({
      state: 'proposed',
      verdict: 'photometric',
      follows: first.id,
    });
    const own = await callApi(approveSolution, { token: photometrist, params, body: {} });
    expect(own.status).toBe(403);
    const approved = await callApi(approveSolution, { token: second, params, body: { comment: 'Agreed.' } });
    expect(bodyOf<Solution>(approved), approved.text).toMatchObject({ state: 'approved' });
    await transformAnew(id);
    const comments = await callApi(listSolutionComments, { token: observer, params });
    expect(bodyOf<List<SolutionComment>>(comments).items.map(({ act }) => act)).toEqual([
      'comment',
      'propose',
      'approve',
    ]);
    const stale = await callApi(withdrawSolution, {
      token: second,
      params,
      body: { comment: 'a second look', version: 1 },
    });
    expect(stale.status).toBe(412);
    const gone = await callApi(withdrawSolution, {
      token: second,
      params,
      body: { comment: 'a second look' },
    });
    expect(bodyOf<Solution>(gone)).toMatchObject({ state: 'withdrawn' });
    expect((await callApi(getSolution, { token: pi, params })).status).toBe(404);
  });

  it('is solved once for one Idempotency-Key', async () => {
    const sent = {
      token: observer,
      params: { id: night.id },
      body: {},
      headers: { 'idempotency-key': `k-${night.id}` },
    };
    const [one, two] = [await callApi(solveNight, sent), await callApi(solveNight, sent)];
    expect(bodyOf<QueuedSolution>(two)).toEqual(bodyOf<QueuedSolution>(one));
    await untilDone(bodyOf<QueuedSolution>(one).job, observer);
  });

  it('is refused with the path of what makes no sense', async () => {
    const answer = await callApi(solveNight, {
      token: observer,
      params: { id: night.id },
      body: { bands: ['V'], priors: { B: { extinction: { value: 0.2, error: 0.02 } } } },
    });
    expect(answer.status).toBe(400);
    expect(answer.text).toContain('priors.B');
  });
});
