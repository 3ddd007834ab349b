import { beforeAll, describe, expect, it } from 'vitest';
import { FrameInput } from '@/lib/contracts/api/frame';
import type { Night } from '@/lib/contracts/api/night';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { listNights } from '@/lib/server/reads/list-nights';
import { night as readNight } from '@/lib/server/reads/night';
import { nightConditions, nightRemarks, nightTimeLosses } from '@/lib/server/reads/night-entries';
import { nightFrame, nightFrames } from '@/lib/server/reads/night-frames';
import { nightPage } from '@/lib/server/reads/night-page';
import { nightsCalendar } from '@/lib/server/reads/nights-calendar';
import { objectNames } from '@/lib/server/reads/object-names';
import { faultOf } from '../../support/fault-of';
import { newCaller, newLogWorld, newStandards } from '../../support/log-world';

let noor: PersonCaller;
let manager: PersonCaller;
let thistlePi: PersonCaller;
let marrowCo: PersonCaller;
let nobody: PersonCaller;
/** One night of both programmes, one of LV Marrow alone, one without either. */
let both: Night;
let marrowOnly: Night;
let empty: Night;

beforeAll(async () => {
  const world = await newLogWorld();
  await newStandards();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  manager = await newCaller('Imogen Tarrant', { roles: ['manager'] });
  thistlePi = await newCaller('Tomas Verrall', { programmes: [[world.thistle, 'pi']] });
  marrowCo = await newCaller('Wren Achterberg', { programmes: [[world.marrow, 'coinvestigator']] });
  nobody = await newCaller('Nobody');
  both = await openNight(noor, { telescope: 'larkspur', date: '2026-11-03' });
  marrowOnly = await openNight(noor, { telescope: 'larkspur', date: '2026-11-04' });
  empty = await openNight(noor, { telescope: 'larkspur', date: '2026-10-30' });
  const frames = [
    { type: 'bias', exposure: 0 },
    { type: 'flat', band: 'V' },
    { type: 'standard', object: 'SA 98', band: 'V' },
    { type: 'standard', object: 'SA 98', band: 'V', programme: 'MH26B-11' },
    { type: 'target', object: 'Thistle 3', band: 'V' },
    { type: 'target', object: 'LV Marrow', band: 'V' },
    { type: 'focus', object: 'a bright star' },
  ];
  const on = (date: string) =>
    frames.map((frame) => FrameInput.parse({ utc_start: `${date}T23:00:00Z`, exposure: 10, ...frame }));
  await logFrames(noor, both.id, on('2026-11-03'), { origin: 'log', isList: true });
  await logFrames(noor, marrowOnly.id, on('2026-11-04').slice(5), { origin: 'log', isList: true });
});

const page = { limit: 100 };
const datesOf = async (caller: PersonCaller): Promise<readonly string[]> =>
  (await listNights(caller, page)).items.map(({ date }) => date);
const objectsOf = async (caller: PersonCaller, night: Night): Promise<readonly string[]> =>
  (await nightFrames(caller, night.id, page)).items.map(({ type, object, programme }) =>
    [type, object, programme ?? ''].join(' ').trim(),
  );

describe('who sees which nights', () => {
  it('lets observers, photometrists and managers see every one, the latest first', async () => {
    expect(await datesOf(noor)).toEqual(['2026-11-04', '2026-11-03', '2026-10-30']);
    expect(await datesOf(manager)).toEqual(['2026-11-04', '2026-11-03', '2026-10-30']);
  });

  it('lets investigators see those with frames of their programmes, and nobody else any', async () => {
    expect(await datesOf(thistlePi)).toEqual(['2026-11-03']);
    expect(await datesOf(marrowCo)).toEqual(['2026-11-04', '2026-11-03']);
    expect(await datesOf(nobody)).toEqual([]);
  });

  it('does not tell investigators whether a night of others exists', async () => {
    const reads = [readNight, nightPage, nightTimeLosses].map((read) => () => read(thistlePi, marrowOnly.id));
    const pages = [nightFrames, nightConditions, nightRemarks].map(
      (read) => () => read(thistlePi, marrowOnly.id, page),
    );
    for (const work of [...reads, ...pages]) {
      const fault = await faultOf(work());
      expect(fault.code).toBe('not-found');
      expect(fault.message).toBe((await faultOf(readNight(thistlePi, 'no such id'))).message);
    }
  });

  it('filters by telescope, dates and state, and pages by date', async () => {
    expect(
      (await listNights(noor, { ...page, from: '2026-11-01', to: '2026-11-03' })).items.map(({ id }) => id),
    ).toEqual([both.id]);
    expect((await listNights(noor, { ...page, state: 'closed' })).items).toEqual([]);
    expect((await listNights(noor, { ...page, telescope: 'old-larkspur' })).items).toEqual([]);
    const first = await listNights(noor, { limit: 2 });
    const rest = await listNights(noor, { limit: 2, after: first.next ?? '' });
    expect([...first.items, ...rest.items].map(({ id }) => id)).toEqual([marrowOnly.id, both.id, empty.id]);
    expect(rest.next).toBeNull();
    expect((await faultOf(listNights(noor, { limit: 2, after: 'bm9uc2Vuc2U' }))).issues[0]?.path).toBe(
      'after',
    );
  });

  it('shows a month with what the caller may see', async () => {
    const month = await nightsCalendar(noor, { month: '2026-11' });
    expect(month.map(({ date, state, frames }) => [date, state, frames])).toEqual([
      ['2026-11-03', 'open', 7],
      ['2026-11-04', 'open', 2],
    ]);
    expect(
      (await nightsCalendar(thistlePi, { month: '2026-11' })).map(({ date, frames }) => [date, frames]),
    ).toEqual([['2026-11-03', 4]]);
    expect(await nightsCalendar(noor, { month: '2026-11', telescope: 'old-larkspur' })).toEqual([]);
  });
});

describe('who sees which frames', () => {
  it('lets investigators see their own, and calibration and standards that belong to no programme', async () => {
    expect(await objectsOf(thistlePi, both)).toEqual([
      'bias',
      'flat',
      'standard SA 98',
      'target Thistle 3 MH26B-04',
    ]);
    expect(await objectsOf(marrowCo, both)).toEqual([
      'bias',
      'flat',
      'standard SA 98',
      'standard SA 98 MH26B-11',
      'target LV Marrow MH26B-11',
    ]);
    expect((await readNight(thistlePi, both.id)).frames).toBe(4);
    expect(await objectsOf(noor, both)).toHaveLength(7);
  });

  it('does not tell whether a frame of another programme exists', async () => {
    const all = (await nightFrames(noor, both.id, page)).items;
    const foreign = all.find(({ object }) => object === 'LV Marrow');
    expect((await faultOf(nightFrame(thistlePi, { night: both.id, frame: foreign?.id ?? '' }))).code).toBe(
      'not-found',
    );
    expect((await nightFrame(marrowCo, { night: both.id, frame: foreign?.id ?? '' })).object).toBe(
      'LV Marrow',
    );
  });

  it('filters frames by type, band, name and time', async () => {
    const found = async (query: object): Promise<number> =>
      (await nightFrames(noor, both.id, { ...page, ...query })).items.length;
    expect(await found({ type: 'standard' })).toBe(2);
    expect(await found({ band: 'V' })).toBe(5);
    expect(await found({ object: 'thistle-3' })).toBe(1);
    expect(await found({ from: '2026-11-03T23:00:05Z', to: '2026-11-03T23:00:06Z' })).toBe(6);
  });

  it('shows the page of a night to each as the lists do', async () => {
    const shown = await nightPage(thistlePi, both.id);
    expect(shown.frames.map(({ type }) => type)).toEqual(['bias', 'flat', 'standard', 'target']);
    expect(shown.may).toEqual({ log: false, close: false, reopen: false, upload: true });
    const own = await nightPage(noor, both.id);
    expect(own.may).toEqual({ log: true, close: true, reopen: false, upload: true });
    expect(own.telescope.filters.map(({ band }) => band)).toEqual(['U', 'B', 'V', 'R', 'I']);
    expect(own.site).toMatchObject({ name: 'Marrow Hill', longitude: -17.25, timezone: 'Atlantic/Canary' });
  });
});

describe('names that complete', () => {
  it('are the targets of the programmes that one may see, and the standard fields with their centres', async () => {
    const names = async (caller: PersonCaller, q = ''): Promise<readonly string[]> =>
      (await objectNames(caller, { q, limit: 1000 })).items.map(({ name }) => name);
    expect(await names(noor)).toEqual(['LV Marrow', 'Thistle 3', 'SA 98', 'ZZ 1']);
    expect(await names(thistlePi)).toEqual(['Thistle 3', 'SA 98', 'ZZ 1']);
    expect(await names(noor, 'sa98')).toEqual(['SA 98']);
    const [field] = (await objectNames(noor, { q: 'SA 98', limit: 1 })).items;
    expect(field).toMatchObject({ kind: 'standard field', programme: null });
    expect(Math.abs((field?.ra ?? 0) - 103)).toBeLessThan(1e-9);
  });
});
