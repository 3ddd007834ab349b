import { afterEach, beforeEach, expect, it } from 'vitest';
import { FrameInput } from '@/lib/contracts/api/frame';
import { logFrames } from '@/lib/server/acts/log-frames';
import { namesOfFlags } from '@/lib/photometry/calibrated-flags';
import { execute, selectOne } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import {
  newSolution,
  setSolutionState,
  storedStars,
  targetNight,
  targetTable,
  transform,
  transformationStates,
  trueStars,
  type FieldFrames,
  type TargetNight,
} from '@/tests/support/calibrated';
import { emptyTables } from '@/tests/support/database';
import { newCaller, newLogWorld, type LogWorld } from '@/tests/support/log-world';
import { filesIn, mailsOf, removeOriginals } from '@/tests/support/measurements';
import { expectWithin } from '@/tests/support/numbers';
import { takeTargets } from '@/tests/support/take-targets';

removeOriginals();

const thistle: FieldFrames = { object: 'Thistle 3', ra: 83.5, dec: 22.1, first: 1, n: 8, begin_hours: 3 };
const marrow: FieldFrames = { object: 'LV Marrow', ra: 12.25, dec: 41.2, first: 9, n: 4, begin_hours: -2 };
const stars = trueStars(400, { name: 'T', ra: 83.5, dec: 22.1 });
const variable = trueStars(5, { name: 'M', ra: 12.25, dec: 41.2 }, 5);
const starsOf = (field: FieldFrames) => (field === thistle ? stars : variable);
const table = targetTable([thistle, marrow], starsOf);

let world: LogWorld;
let noor: PersonCaller;
let bram: PersonCaller;
let night: TargetNight;
beforeEach(async () => {
  world = await newLogWorld();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
  await newCaller('Piet Sandoval', { programmes: [[world.thistle, 'pi']] });
  await newCaller('Cora Lindqvist', { programmes: [[world.thistle, 'coinvestigator']] });
  await newCaller('Mara Duc', { programmes: [[world.marrow, 'pi']] });
  night = await targetNight(noor, [thistle, marrow]);
});
afterEach(emptyTables);

const approved = (programmes = [world.thistle, world.marrow]): Promise<string> =>
  newSolution(night, { person: bram, programmes });

it('magnitudes come out at the truth within the errors that they state', async () => {
  await takeTargets(noor, night, table);
  const solution = await approved();
  expect(await transform({ solution, night: night.id })).toEqual({
    outcome: 'stored',
    programmes: 2,
    measurements: 400 * 8 + 5 * 4,
    stars: 405,
  });
  const stored = await storedStars(solution);
  const own = stored.filter(({ programme }) => programme === 'MH26B-04');
  expect(own.map(({ star }) => star)).toEqual(stars.map(({ name }) => name));
  const pulls = own.flatMap((row, index) => {
    const star = stars[index];
    if (!star) throw new Error('A star too many.');
    expectWithin(row.ra, star.ra, { absolute: 2e-7, unit: 'deg' });
    expectWithin(row.decl, star.dec, { absolute: 2e-7, unit: 'deg' });
    expect(row).toMatchObject({ nB: 4, nV: 4, flags: 0 });
    expect(row.vSystematic).toBeGreaterThan(0.002);
    return [(row.v - star.V) / row.vRandom, (row.bv - star.BV) / row.bvRandom];
  });
  const mean = pulls.reduce((sum, pull) => sum + pull, 0) / pulls.length;
  const deviation = Math.sqrt(pulls.reduce((sum, pull) => sum + (pull - mean) ** 2, 0) / (pulls.length - 1));
  expectWithin(mean, 0, { absolute: 0.12, unit: 'sigma' });
  expectWithin(deviation, 1, { absolute: 0.1, unit: 'sigma' });
  // 3 November 2026, 23 h UTC and 3 h later; light reaches the barycentre within 8.4 minutes of the Earth.
  expectWithin(own[0]?.bjd ?? NaN, 2461348.4583 + 3 / 24 + 0.006, { absolute: 0.006, unit: 'd' });
  expect(await filesIn('work')).toEqual([]);
});

it('a star far from the middle of its frame is brought through the air above itself', async () => {
  const apart = stars.map((star, i) => ({ ...star, dec: star.dec - (i % 2 === 0 ? 0 : 40) }));
  await takeTargets(
    noor,
    night,
    targetTable([thistle], () => apart),
  );
  const solution = await approved([world.thistle]);
  await transform({ solution, night: night.id });
  const stored = await storedStars(solution);
  const mean = (odd: number): number => {
    const off = stored.filter((_, i) => i % 2 === odd).map(({ v }, i) => v - (apart[2 * i + odd]?.V ?? NaN));
    return off.reduce((sum, value) => sum + value, 0) / off.length;
  };
  // By the airmass of the middle the southern half would come out wrong by 0.08 mag.
  expect(stored).toHaveLength(400);
  expectWithin(mean(0), 0, { absolute: 0.003, unit: 'mag' });
  expectWithin(mean(1), 0, { absolute: 0.003, unit: 'mag' });
});

it('one mail goes to each investigator of a programme, and to nobody else', async () => {
  await takeTargets(noor, night, table);
  const solution = await approved();
  await transform({ solution, night: night.id });
  const mails = await mailsOf('night-calibrated');
  expect(mails.map(({ subject }) => subject)).toEqual([
    'Calibrated: MH26B-04, 3 November 2026, Larkspur 0.8 m',
    'Calibrated: MH26B-04, 3 November 2026, Larkspur 0.8 m',
    'Calibrated: MH26B-11, 3 November 2026, Larkspur 0.8 m',
  ]);
  const mail = await selectOne<{ text: string; html: string }>(
    `SELECT text, html FROM mails m JOIN people p ON p.id = m.person_id WHERE p.name = 'Piet Sandoval'`,
  );
  for (const part of ['photometric', '400', '3,200', '0.1400 ± 0.0010', 'number 1', '0.0100 mag'])
    expect(mail?.text, part).toContain(part);
  expect(mail?.text).toContain(`http://evenfall.example/nights/${night.id}/results?programme=MH26B-04`);
  expect(mail?.text).toContain('is flagged');
  expect(mail?.html).toContain('MH26B-04');
  // Nothing of the other programme.
  expect(mail?.text).not.toContain('MH26B-11');
});

it('run twice it changes nothing and sends nothing anew', async () => {
  await takeTargets(noor, night, table);
  const solution = await approved();
  const first = await transform({ solution, night: night.id });
  const before = await storedStars(solution);
  expect(await transform({ solution, night: night.id })).toEqual(first);
  expect(await storedStars(solution)).toEqual(before);
  expect(await mailsOf('night-calibrated')).toHaveLength(3);
});

it('a later solution has values of its own and those of its predecessor stay', async () => {
  await takeTargets(noor, night, table);
  const earlier = await approved();
  await transform({ solution: earlier, night: night.id });
  const before = await storedStars(earlier);
  await setSolutionState(earlier, 'superseded');
  const later = await approved();
  await transform({ solution: later, night: night.id });
  expect(await storedStars(earlier)).toEqual(before);
  expect(await storedStars(later)).toHaveLength(405);
  const subjects = (await mailsOf('night-calibrated')).map(({ subject }) => subject.split(':')[0]);
  expect(subjects).toEqual([
    ...Array<string>(3).fill('Calibrated'),
    ...Array<string>(3).fill('Calibrated anew'),
  ]);
});

it('a solution withdrawn before the job begins, or while it stores, leaves nothing and no mail', async () => {
  await takeTargets(noor, night, table);
  const before = await newSolution(night, { person: bram, programmes: [world.thistle], state: 'withdrawn' });
  const nothing = { outcome: 'not-approved', programmes: 0, measurements: 0, stars: 0 };
  expect(await transform({ solution: before, night: night.id })).toEqual(nothing);
  const during = await approved();
  let withdrawn: Promise<unknown> | undefined;
  const progress = (_fraction: number, message: string): void => {
    if (message.startsWith('Storing')) withdrawn ??= setSolutionState(during, 'withdrawn');
  };
  expect(await transform({ solution: during, night: night.id }, { progress })).toEqual(nothing);
  expect(await withdrawn).toBe(1);
  expect(await storedStars(during)).toEqual([]);
  expect(await transformationStates(during)).toEqual(['withdrawn', 'withdrawn']);
  expect(await mailsOf('night-calibrated')).toEqual([]);
});

it('a job that is cancelled while it stores leaves nothing and can be done again', async () => {
  await takeTargets(noor, night, table);
  const solution = await approved();
  const stop = new AbortController();
  const progress = (_fraction: number, message: string): void => {
    if (message.startsWith('Storing')) stop.abort(new Error('Stopped by the test.'));
  };
  // The first statement is in when the stop is noticed at the second programme's.
  await expect(transform({ solution, night: night.id }, { progress, signal: stop.signal })).rejects.toThrow(
    'Stopped by the test.',
  );
  expect(await storedStars(solution)).toEqual([]);
  expect(await transformationStates(solution)).toEqual(['queued', 'queued']);
  expect(await transform({ solution, night: night.id })).toMatchObject({ stars: 405 });
});

it('flags and saturation of tables count, and what is marked bad is left out and told', async () => {
  await execute(
    `INSERT INTO cameras (telescope_id, name, width_px, height_px, pixel_scale, gain, read_noise, saturation)
     VALUES (:telescope, 'K', 1024, 1024, 0.5, 1, 5, 60000)`,
    { telescope: world.telescopeId },
    null,
  );
  const rows = table.split('\n');
  const mend = (row: number, peak: string, flag: string): void => {
    rows[row] = rows[row]?.replace(/,20000,$/, `,${peak},${flag}`) ?? '';
  };
  mend(1, '20000', 'Saturated near edge');
  mend(2, '60000', '');
  mend(3, '20000', 'bad; cosmic ray');
  mend(4, '20000', 'blend');
  // Star 5 on each frame in B: with nothing better it is used, and says so.
  for (const frame of [0, 2, 4, 6]) mend(5 + 400 * frame, '65000', '');
  await takeTargets(noor, night, rows.join('\n'));
  const solution = await approved();
  expect(await transform({ solution, night: night.id })).toMatchObject({ measurements: 3219 });
  const all = await storedStars(solution);
  const stored = stars.slice(0, 5).map(({ name }) => all.find(({ star }) => star === name));
  expect(stored.map((row) => row?.nB)).toEqual([3, 3, 3, 4, 4]);
  expect(stored.map((row) => namesOfFlags(row?.flags ?? 0))).toEqual([[], [], [], [], ['saturated']]);
  expect(await selectOne('SELECT n_left_out AS n FROM transformations ORDER BY id LIMIT 1')).toEqual({
    n: 1,
  });
}, 60_000);

it('a table that measures the same frames anew takes the place of the older one', async () => {
  await takeTargets(noor, night, table);
  const brighter = targetTable([thistle], (field) =>
    starsOf(field).map((star) => ({
      ...star,
      name: star.name.toLowerCase().replace(' ', '-'),
      V: star.V - 1,
    })),
  );
  await takeTargets(noor, night, brighter);
  const solution = await approved();
  expect(await transform({ solution, night: night.id })).toMatchObject({ measurements: 3220, stars: 405 });
  const [first] = await storedStars(solution);
  expect(first).toMatchObject({ nB: 4, nV: 4 });
  expectWithin(first?.v ?? NaN, (stars[0]?.V ?? NaN) - 1, { absolute: 0.05, unit: 'mag' });
});

it('a frame without a position gives no magnitude, and the measurements on it are counted', async () => {
  const frame = { type: 'target', object: 'no place', programme: 'MH26B-04', band: 'V', exposure: 60 };
  await logFrames(noor, night.id, [FrameInput.parse({ ...frame, utc_start: '2026-11-03T21:45:00Z' })], {
    origin: 'log',
    isList: false,
  });
  await takeTargets(noor, night, `${table}13,T 1,83.5,22.1,-7,0.01,20000,\n`);
  const solution = await approved();
  expect(await transform({ solution, night: night.id })).toMatchObject({ measurements: 3220, stars: 405 });
  expect(await selectOne('SELECT SUM(n_left_out) + 0 AS n FROM transformations')).toMatchObject({ n: 1 });
});
