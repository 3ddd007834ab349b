import { beforeAll, describe, expect, it } from 'vitest';
import type { CalibratedPage, CalibratedPageQuery, CalibratedResult } from '@/lib/contracts/calibrated-page';
import { FrameInput } from '@/lib/contracts/api/frame';
import { isFault } from '@/lib/faults/fault';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { execute, inTransaction, selectOne } from '@/lib/server/data/database';
import { enqueue } from '@/lib/server/jobs/enqueue';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { calibratedPage } from '@/lib/server/reads/calibrated-page';
import { newCallers, newLogWorld } from '@/tests/support/log-world';
import { expectWithin } from '@/tests/support/numbers';
import { addStars, newResult, newSolution, type MadeSolution } from '@/tests/support/results';

let as: (name: string) => PersonCaller;
let night: string;
/** A night with targets and no solution. */
let bare: string;
let waiting: string;
let earlier: MadeSolution;
let approved: MadeSolution;
/** Of the night that waits. */
let queued: MadeSolution;
let marrowId: number;

async function nightWithTargets(date: string): Promise<string> {
  const { id } = await openNight(as('observer'), { telescope: 'larkspur', date });
  const utc_start = `${date}T22:00:00Z`;
  const frame = { type: 'target', band: 'V', utc_start, exposure: 30 } as const;
  await logFrames(
    as('observer'),
    id,
    [
      FrameInput.parse({ ...frame, object: 'Thistle 3', programme: 'MH26B-04' }),
      FrameInput.parse({
        ...frame,
        object: 'LV Marrow',
        programme: 'MH26B-11',
        utc_start: `${date}T23:00:00Z`,
      }),
    ],
    { origin: 'log', isList: true },
  );
  return id;
}

beforeAll(async () => {
  const { thistle, marrow } = await newLogWorld();
  marrowId = marrow;
  as = await newCallers({
    observer: { roles: ['observer'] },
    otherObserver: { roles: ['observer'] },
    photometrist: { roles: ['photometrist'] },
    secondPhotometrist: { roles: ['photometrist'] },
    manager: { roles: ['manager'] },
    thistlePi: { programmes: [[thistle, 'pi']] },
    marrowCo: { programmes: [[marrow, 'coinvestigator']] },
    nobody: {},
  });
  night = await nightWithTargets('2026-11-03');
  bare = await nightWithTargets('2026-11-04');
  waiting = await nightWithTargets('2026-11-05');
  const by = as('photometrist');
  const signed = { by, proposedBy: by, approvedBy: as('secondPhotometrist') };
  earlier = await newSolution({ night, number: 1, state: 'superseded', ...signed });
  approved = await newSolution({ night, number: 2, state: 'approved', ...signed });
  await addStars(await newResult({ solution: earlier, night, programme: thistle }), [
    { no: 1, star: 'T 1', v: 12.5 },
  ]);
  await addStars(await newResult({ solution: approved, night, programme: thistle }), [
    { no: 1, star: 'T 10', v: 14, bv: 0.9, random: 0.02, flags: 1 },
    { no: 2, star: 'T 2', v: 12, bv: 0.4 },
    { no: 3, star: 'T 1', v: 13, bv: null, flags: 4 + 8 },
    { no: 4, star: 'T 30%', v: null, bv: null, flags: 4 },
  ]);
  await addStars(await newResult({ solution: approved, night, programme: marrow }), [
    { no: 1, star: 'M 1', v: 15 },
  ]);
  await addStars(await newResult({ solution: approved, night, programme: null }), [
    { no: 1, star: 'unclaimed', v: 16 },
  ]);
  queued = await newSolution({ night: waiting, number: 1, state: 'approved', ...signed });
  await newResult({ solution: queued, night: waiting, programme: thistle, state: 'queued' });
  const nightId = await nightIdOf(waiting);
  await inTransaction((tx) =>
    enqueue(tx, by, {
      kind: 'transform-targets',
      payload: { solution: queued.publicId, night: waiting },
      nightId,
    }),
  );
}, 60_000);

async function nightIdOf(publicId: string): Promise<number> {
  const row = await selectOne<{ id: number }>(`SELECT id FROM nights WHERE public_id = :publicId`, {
    publicId,
  });
  return row?.id ?? 0;
}

const page = (name: string, query: CalibratedPageQuery = {}, id = night): Promise<CalibratedPage> =>
  calibratedPage(as(name), id, query);

async function result(name: string, query: CalibratedPageQuery = {}): Promise<CalibratedResult> {
  const shown = await page(name, query);
  if ('why' in shown.result) throw new Error(`There is no result: ${shown.result.why}.`);
  return shown.result;
}
const names = async (query: CalibratedPageQuery): Promise<readonly string[]> =>
  (await result('photometrist', { programme: 'MH26B-04', ...query })).stars.map(({ star }) => star);

const codes = async (name: string): Promise<readonly string[]> =>
  (await page(name)).programmes.map(({ code }) => code);

describe('who sees which calibrated magnitudes', () => {
  it.each(['photometrist', 'manager', 'observer'])(
    'all programmes, and what belongs to none: the %s of the night',
    async (name) => {
      expect(await codes(name)).toEqual(['MH26B-04', 'MH26B-11', '']);
      expect((await result(name, { programme: '' })).stars.map(({ star }) => star)).toEqual(['unclaimed']);
    },
  );

  it.each([
    ['thistlePi', 'MH26B-04', 'MH26B-11'],
    ['marrowCo', 'MH26B-11', 'MH26B-04'],
  ])('%s sees those of %s, and nothing of %s or of no programme', async (name, own, foreign) => {
    expect(await codes(name)).toEqual([own]);
    for (const programme of [foreign, '']) {
      await expect(page(name, { programme })).rejects.toSatisfy((error) => isFault(error, 'not-found'));
    }
  });

  it('another observer sees the night’s log, and is told that its magnitudes are not theirs', async () => {
    expect((await page('otherObserver')).result).toEqual({ why: 'hidden' });
    expect(await codes('otherObserver')).toEqual([]);
  });

  it('to whoever has no part in the night it is not there', async () => {
    await expect(page('nobody')).rejects.toSatisfy((error) => isFault(error, 'not-found'));
  });

  it('a solution of another night is not there', async () => {
    const other = await newSolution({ night: bare, number: 1, state: 'superseded', by: as('photometrist') });
    await expect(page('manager', { solution: other.publicId })).rejects.toSatisfy((error) =>
      isFault(error, 'not-found'),
    );
  });
});

describe('the list of stars', () => {
  it('opens by V, the brightest first and what has no V last, unless it is sorted', async () => {
    expect(await names({})).toEqual(['T 2', 'T 1', 'T 10', 'T 30%']);
    expect(await names({ descending: true })).toEqual(['T 10', 'T 1', 'T 2', 'T 30%']);
    expect(await names({ sort: 'star' })).not.toEqual(await names({}));
  });

  it('stands in the same order when stars are sought by name or colour', async () => {
    expect(await names({ star: 'T' })).toEqual(await names({}));
    expect(await names({ bv_from: 0.1 })).toEqual(['T 2', 'T 10']);
  });

  it('sorts names as people count, and what has no value last either way', async () => {
    expect(await names({ sort: 'star' })).toEqual(['T 1', 'T 2', 'T 10', 'T 30%']);
    expect(await names({ sort: 'V' })).toEqual(['T 2', 'T 1', 'T 10', 'T 30%']);
    expect(await names({ sort: 'V', descending: true })).toEqual(['T 10', 'T 1', 'T 2', 'T 30%']);
    expect(await names({ sort: 'V_total', descending: true })).toEqual(['T 10', 'T 2', 'T 1', 'T 30%']);
  });

  it('is narrowed by ranges with their ends, by name and by cautions', async () => {
    expect(await names({ v_from: 13, v_to: 14 })).toEqual(['T 1', 'T 10']);
    expect(await names({ bv_from: 0.5 })).toEqual(['T 10']);
    expect(await names({ bv_to: 0.4 })).toEqual(['T 2']);
    expect(await names({ clean: true })).toEqual(['T 2']);
    expect(await names({ star: '%' })).toEqual(['T 30%']);
    expect(await names({ star: "'" })).toEqual([]);
  });

  it('counts a caution that the whole night has against no single star', async () => {
    await execute(
      'UPDATE calibrated_magnitudes SET flags = flags | 64 WHERE star LIKE :t',
      { t: 'T %' },
      null,
    );
    const { stars, nClean, cautions, diagram } = await result('thistlePi', { clean: true });
    await execute(
      'UPDATE calibrated_magnitudes SET flags = flags & ~64 WHERE star LIKE :t',
      { t: 'T %' },
      null,
    );
    expect(stars.map(({ star, flags }) => [star, flags])).toEqual([['T 2', ['night_with_care']]]);
    expect(nClean).toBe(1);
    expect(cautions[0]).toEqual({ flag: 'night_with_care', nStars: 4 });
    expect(diagram.map(({ star, hasCautions }) => [star, hasCautions])).toEqual([['T 2', false]]);
  });

  it('has the total error of each magnitude beside its parts, and its cautions by name', async () => {
    const { stars } = await result('thistlePi');
    const [first, third] = [1, 3].map((no) => stars.find((star) => star.no === no));
    expectWithin(first?.V_total ?? NaN, Math.hypot(0.02, 0.004), { absolute: 1e-12, unit: 'mag' });
    expect(first).toMatchObject({ V_random: 0.02, V_systematic: 0.004, flags: ['colour_range'], n_V: 3 });
    expect(third).toMatchObject({ BV: null, flags: ['single_band', 'assumed_colour'] });
  });

  it('counts each caution over the whole result, whatever the list is narrowed to', async () => {
    const { cautions, nStars, nClean, nShown } = await result('thistlePi', { clean: true });
    expect({ nStars, nClean, nShown }).toEqual({ nStars: 4, nClean: 1, nShown: 1 });
    expect(cautions[0]).toEqual({ flag: 'single_band', nStars: 2 });
    expect(cautions.map(({ flag }) => flag).sort()).toEqual([
      'assumed_colour',
      'colour_range',
      'single_band',
    ]);
  });

  it('is the approved solution’s; the superseded one’s stays to be chosen and says so', async () => {
    const shown = await page('thistlePi');
    expect(shown.solutions.map(({ number, state }) => [number, state])).toEqual([
      [2, 'approved'],
      [1, 'superseded'],
    ]);
    const old = await result('thistlePi', { solution: earlier.publicId });
    expect(old.origin).toMatchObject({ number: 1, state: 'superseded', standardsSource: 'Landolt 1992' });
    expect(old.origin.telescope).toBe('Larkspur 0.8 m');
    expect(old.stars.map(({ V }) => V)).toEqual([12.5]);
  });
});

describe('pages and diagram', () => {
  beforeAll(async () => {
    const made = await selectOne<{ id: number }>(
      'SELECT id FROM transformations WHERE solution_id = :id AND programme_id = :programme',
      { id: approved.id, programme: marrowId },
    );
    await addStars(
      made?.id ?? 0,
      Array.from({ length: 248 }, (_, i) => ({ no: 100 + i, star: `P ${i}`, v: 10 + i / 100 })),
    );
  }, 60_000);

  it('runs on page by page without a star twice or left out, and ends at the last', async () => {
    const seen: number[] = [];
    for (const number of [1, 2, 3]) {
      const shown = await result('marrowCo', { page: number, sort: 'airmass' });
      expect(shown).toMatchObject({ page: number, nPages: 3, nShown: 249 });
      seen.push(...shown.stars.map(({ no }) => no));
    }
    expect(new Set(seen).size).toBe(249);
    expect(await result('marrowCo', { page: 99 })).toMatchObject({ page: 3 });
  });

  it('opens at the page on which a star stands', async () => {
    for (const order of [{}, { sort: 'V' }] as const) {
      const shown = await result('marrowCo', { at: 320, ...order });
      expect(shown.page).toBe(3);
      expect(shown.stars.some(({ no }) => no === 320)).toBe(true);
    }
  });

  it('draws the stars of the list that have both V and B−V', async () => {
    const { diagram, nDiagram } = await result('thistlePi');
    expect(nDiagram).toBe(2);
    expect(diagram).toEqual([
      { no: 1, star: 'T 10', V: 14, BV: 0.9, hasCautions: true },
      { no: 2, star: 'T 2', V: 12, BV: 0.4, hasCautions: false },
    ]);
  });
});

describe('where there is nothing to show', () => {
  it('says that nobody has approved a solution', async () => {
    expect((await page('thistlePi', {}, bare)).result).toEqual({ why: 'no-solution' });
  });

  it('says how far the transformation is', async () => {
    expect((await page('thistlePi', {}, waiting)).result).toMatchObject({
      why: 'running',
      job: { state: 'queued', progress: 0 },
    });
  });

  it.each([
    ['manager', true],
    ['photometrist', true],
    ['observer', false],
    ['thistlePi', false],
  ])('says whether the %s may start it again: %s', async (name, mayStart) => {
    expect((await page(name, { programme: 'MH26B-04' }, waiting)).result).toMatchObject({ mayStart });
  });

  it('says that there was no target of theirs', async () => {
    expect((await page('marrowCo', {}, waiting)).result).toEqual({ why: 'no-targets' });
  });

  it('says that the night was judged not photometric, and by which solution', async () => {
    const setVerdict = (verdict: string) =>
      execute('UPDATE solutions SET verdict = :verdict WHERE id = :id', { verdict, id: queued.id }, null);
    await setVerdict('not photometric');
    const shown = await page('marrowCo', {}, waiting);
    await setVerdict('photometric');
    expect(shown.result).toEqual({ why: 'not-photometric', solution: queued.publicId });
  });

  it('does not put superseded magnitudes in the place of withdrawn ones, but leads to them', async () => {
    await execute("UPDATE solutions SET state = 'withdrawn' WHERE id = :id", { id: approved.id }, null);
    const shown = await page('thistlePi');
    await execute("UPDATE solutions SET state = 'approved' WHERE id = :id", { id: approved.id }, null);
    expect(shown.result).toEqual({ why: 'no-solution' });
    expect(shown.solutions.map(({ number }) => number)).toEqual([1]);
  });
});
