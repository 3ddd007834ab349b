import { afterEach, beforeEach, expect, it } from 'vitest';
import { cancelJob } from '@/lib/server/acts/cancel-job';
import { transformAgain } from '@/lib/server/acts/transform-again';
import { select } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { calibratedPage } from '@/lib/server/reads/calibrated-page';
import {
  newSolution,
  setSolutionState,
  storedStars,
  targetNight,
  targetTable,
  transform,
  trueStars,
  type FieldFrames,
  type TargetNight,
} from '@/tests/support/calibrated';
import { emptyTables } from '@/tests/support/database';
import { faultOf } from '@/tests/support/fault-of';
import { jobNow } from '@/tests/support/jobs';
import { newCaller, newLogWorld, type LogWorld } from '@/tests/support/log-world';
import { removeOriginals } from '@/tests/support/measurements';
import { takeTargets } from '@/tests/support/take-targets';

removeOriginals();
const thistle: FieldFrames = { object: 'Thistle 3', ra: 83.5, dec: 22.1, first: 1, n: 2, begin_hours: 3 };
const stars = trueStars(10, { name: 'T', ra: 83.5, dec: 22.1 });
let world: LogWorld;
let noor: PersonCaller;
let bram: PersonCaller;
let ilse: PersonCaller;
let night: TargetNight;
let solution: string;
beforeEach(async () => {
  world = await newLogWorld();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
  ilse = await newCaller('Ilse Varga', { roles: ['manager'] });
  night = await targetNight(noor, [thistle]);
  await takeTargets(
    noor,
    night,
    targetTable([thistle], () => stars),
  );
  solution = await newSolution(night, { person: bram, programmes: [world.thistle] });
});
afterEach(emptyTables);

const shown = async () => (await calibratedPage(bram, night.id, {})).result;

it('a transformation whose job was cancelled is started again, and comes to its end', async () => {
  const first = await transformAgain(bram, solution);
  await cancelJob(ilse, first.job);
  expect(await shown()).toMatchObject({ why: 'running', job: { id: first.job, state: 'cancelled' } });

  const second = await transformAgain(bram, solution);
  expect(second.job).not.toBe(first.job);
  expect(await shown()).toMatchObject({ why: 'running', job: { id: second.job, state: 'queued' } });
  expect(await jobNow(second.job)).toMatchObject({ dedupeKey: `transform-targets:${solution}` });
  await transform({ solution, night: night.id });
  expect(await storedStars(solution)).toHaveLength(10);
  expect(await shown()).not.toHaveProperty('why');
  const audit = await select<{ act: string }>(
    `SELECT act FROM audit_events WHERE act = 'solution.transform-again'`,
    {},
  );
  expect(audit).toHaveLength(2);
});

it('a second job is not made beside a living one, for two people at once too', async () => {
  const outcomes = await Promise.allSettled([transformAgain(bram, solution), transformAgain(ilse, solution)]);
  expect(outcomes.map(({ status }) => status).toSorted()).toEqual(['fulfilled', 'rejected']);
  expect(await faultOf(transformAgain(bram, solution))).toMatchObject({ code: 'conflict' });
  expect(await select(`SELECT id FROM jobs WHERE kind = 'transform-targets'`, {})).toHaveLength(1);
});

it('what is made already, or no longer approved, is not started', async () => {
  await setSolutionState(solution, 'superseded');
  expect(await faultOf(transformAgain(bram, solution))).toMatchObject({ code: 'conflict' });
  await setSolutionState(solution, 'approved');
  await transform({ solution, night: night.id });
  expect(await faultOf(transformAgain(bram, solution))).toMatchObject({ code: 'conflict' });
});

it('starting again is not for observers and investigators, and does not exist for strangers', async () => {
  const piet = await newCaller('Piet Sandoval', { programmes: [[world.thistle, 'pi']] });
  for (const caller of [noor, piet])
    expect(await faultOf(transformAgain(caller, solution))).toMatchObject({ code: 'not-allowed' });
  const ossi = await newCaller('Ossi');
  expect(await faultOf(transformAgain(ossi, solution))).toMatchObject({ code: 'not-found' });
  await transformAgain(ilse, solution);
});
