import { beforeAll, expect, it } from 'vitest';
import { execute } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import {
  newSolution,
  storedStars,
  targetNight,
  targetTable,
  transformationStates,
  trueStars,
  type FieldFrames,
} from '@/tests/support/calibrated';
import { jobNow, queueJob, untilJob } from '@/tests/support/jobs';
import { newCaller, newLogWorld, type LogWorld } from '@/tests/support/log-world';
import { filesIn, mailsOf, removeOriginals } from '@/tests/support/measurements';
import { takeTargets } from '@/tests/support/take-targets';
import { startWorker } from '@/tests/support/worker';

removeOriginals();
const nStars = 30_000;
const thistle: FieldFrames = { object: 'Thistle 3', ra: 83.5, dec: 22.1, first: 1, n: 4, begin_hours: 3 };
let world: LogWorld;
let noor: PersonCaller;
let bram: PersonCaller;
beforeAll(async () => {
  world = await newLogWorld();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
  await newCaller('Piet Sandoval', { programmes: [[world.thistle, 'pi']] });
});

it('a worker that is killed while it transforms leaves nothing of it, and the next one stores all of it once', async () => {
  const stars = trueStars(nStars, { name: 'T', ra: 83.5, dec: 22.1 });
  const night = await targetNight(noor, [thistle]);
  await takeTargets(
    noor,
    night,
    targetTable([thistle], () => stars),
  );
  const solution = await newSolution(night, { person: bram, programmes: [world.thistle] });
  const job = await queueJob({ kind: 'transform-targets', payload: { solution, night: night.id } });

  const first = startWorker();
  await expect
    .poll(() => jobNow(job), { timeout: 60_000, interval: 10 })
    .toMatchObject({ message: expect.stringMatching(/^(Reading|Transforming|Storing).*\d/) as string });
  first.process.kill('SIGKILL');
  await first.ended;
  expect(await jobNow(job)).toMatchObject({ state: 'running', tries: 1 });
  await expect.poll(() => storedStars(solution), { timeout: 20_000 }).toEqual([]);
  expect(await transformationStates(solution)).toEqual(['queued']);
  expect(await mailsOf('night-calibrated')).toEqual([]);

  await execute('UPDATE jobs SET lease_until = NOW(3) WHERE public_id = :job', { job }, null);
  startWorker();
  expect(await untilJob(job, 'done', 120_000)).toMatchObject({
    tries: 2,
    result: { outcome: 'stored', programmes: 1, measurements: nStars * thistle.n, stars: nStars },
  });
  const stored = await storedStars(solution);
  expect(stored).toHaveLength(nStars);
  expect(new Set(stored.map(({ star }) => star)).size).toBe(nStars);
  expect(await transformationStates(solution)).toEqual(['done']);
  expect(await mailsOf('night-calibrated')).toHaveLength(1);
  expect(await filesIn('work')).toEqual([]);
}, 300_000);
