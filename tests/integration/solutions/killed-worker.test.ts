import { beforeAll, expect, it } from 'vitest';
import { SolveOptions } from '@/lib/contracts/solve-options';
import { queueSolve } from '@/lib/server/acts/queue-solve';
import { execute } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { jobNow, untilJob } from '@/tests/support/jobs';
import { newCaller, newLogWorld } from '@/tests/support/log-world';
import { filesIn, removeOriginals } from '@/tests/support/measurements';
import { newField, solutionNow, solvableNight } from '@/tests/support/solutions';
import { startWorker } from '@/tests/support/worker';

removeOriginals();
let noor: PersonCaller;
beforeAll(async () => {
  await newLogWorld();
  await newField();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
});

it('a worker that is killed while it solves leaves nothing of it, and the next one solves it once', async () => {
  const { night } = await solvableNight(noor, { date: '2026-10-01' });
  const { solution, job } = await queueSolve(noor, night.id, SolveOptions.parse({}));
  const first = startWorker();
  await expect.poll(() => jobNow(job), { timeout: 60_000, interval: 10 }).toMatchObject({ state: 'running' });
  first.process.kill('SIGKILL');
  await first.ended;
  expect(await jobNow(job)).toMatchObject({ state: 'running', tries: 1 });
  expect(await solutionNow(solution)).toMatchObject({ outcome: null, observations: 0, bands: 0 });

  await execute('UPDATE jobs SET lease_until = NOW(3) WHERE public_id = :job', { job }, null);
  startWorker();
  expect(await untilJob(job, 'done', 180_000)).toMatchObject({
    tries: 2,
    result: { solution, outcome: 'determined', observations: 96 },
  });
  expect(await solutionNow(solution)).toMatchObject({ state: 'draft', observations: 96, bands: 2 });
  expect(await filesIn('work')).toEqual([]);
}, 300_000);
