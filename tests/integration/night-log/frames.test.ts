import { beforeAll, describe, expect, it } from 'vitest';
import { FrameInput, type Frame } from '@/lib/contracts/api/frame';
import type { Night } from '@/lib/contracts/api/night';
import { closeNight } from '@/lib/server/acts/close-night';
import { correctFrame } from '@/lib/server/acts/correct-frame';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { removeFrame } from '@/lib/server/acts/remove-frame';
import { execute, select } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { nextFrame } from '@/lib/server/reads/next-frame';
import { nightFrames } from '@/lib/server/reads/night-frames';
import { faultOf } from '../../support/fault-of';
import { newCaller, newLogWorld, newProgramme, newStandards } from '../../support/log-world';

let noor: PersonCaller;
let bram: PersonCaller;
let night: Night;
let day = 1;

const single = { origin: 'log', isList: false } as const;
const many = { origin: 'api', isList: true } as const;
const at = (clock: string): string => `${night.date}T${clock}Z`;
const target = (more: object = {}): FrameInput =>
  FrameInput.parse({
    type: 'target',
    object: 'Thistle 3',
    band: 'V',
    utc_start: at('23:00:00'),
    exposure: 60,
    ...more,
  });
async function log(more: object = {}): Promise<Frame> {
  const [frame] = await logFrames(noor, night.id, [target(more)], single);
  if (!frame) throw new Error('Nothing was logged.');
  return frame;
}
const logAll = (inputs: readonly FrameInput[]): Promise<readonly Frame[]> =>
  logFrames(noor, night.id, inputs, many);
const correct = (frame: Frame, patch: object, who = noor): Promise<Frame> =>
  correctFrame(who, { night: night.id, frame: frame.id }, { version: frame.version, ...patch });
const freshNight = async (): Promise<void> => {
  night = await openNight(noor, { telescope: 'larkspur', date: `2026-12-${String(day++).padStart(2, '0')}` });
};
const trail = (subjectId: string) =>
  select<{ act: string; reason: string; before: Record<string, unknown>; after: Record<string, unknown> }>(
    'SELECT act, reason, before_values AS `before`, after_values AS `after` FROM audit_events WHERE subject_id = :subjectId ORDER BY id',
    { subjectId },
  );

beforeAll(async () => {
  await newLogWorld();
  await newStandards();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
  await freshNight();
});

describe('logging a frame', () => {
  it('adds mid-exposure, airmass, altitude, hour angle, Moon and Sun', async () => {
    const frame = await log({ comment: 'first light' });
    expect(frame).toMatchObject({
      number: 1,
      utc_mid: `${night.date}T23:00:30.000Z`,
      origin: 'log',
      version: 1,
    });
    expect(frame).toMatchObject({ logged_by: 'Noor Hathaway', comment: 'first light', cautions: [] });
    expect(frame.altitude).toBeGreaterThan(15);
    // Sec z is within a hundredth of the airmass at this height.
    const sine = Math.sin(((frame.altitude ?? 0) * Math.PI) / 180);
    expect(Math.abs((frame.airmass ?? 0) * sine - 1)).toBeLessThan(0.01);
    expect(Math.abs(frame.hour_angle ?? 99)).toBeLessThan(12);
    expect(frame.moon_separation).toBeGreaterThan(0);
    expect(frame.sun_altitude).toBeLessThan(-18);
  });

  it('completes coordinates and programme from the target’s name, however it is typed', async () => {
    const frame = await log({ object: 'thistle-3' });
    expect(frame).toMatchObject({ object: 'Thistle 3', programme: 'MH26B-04', ra: 83.5, dec: 22.1 });
  });

  it('lets coordinates and programme that were given stand', async () => {
    const frame = await log({ ra: 84, dec: 22, programme: null });
    expect(frame).toMatchObject({ ra: 84, dec: 22, programme: null });
  });

  it('completes a standard field by the mean of its usable stars on the sphere, across 0 h', async () => {
    const frame = await log({ type: 'standard', object: 'zz1' });
    expect(frame.field).toBe('ZZ 1');
    // Half-way between 359.5° and 0.5°, a little nearer to the pole than both.
    expect(Math.min(frame.ra ?? 99, 360 - (frame.ra ?? 99))).toBeLessThan(1e-9);
    expect(frame.dec).toBeGreaterThan(10);
    expect(frame.dec).toBeLessThan(10.001);
  });

  it('finds the field of a standard star, and the star’s own place', async () => {
    const frame = await log({ type: 'standard', object: 'SA 98-1' });
    expect(frame).toMatchObject({ field: 'SA 98', ra: 103, dec: -0.3, programme: null });
  });

  it('takes an object that nobody knows and says that its place is not known', async () => {
    const frame = await log({ object: 'Comet of last week' });
    expect(frame).toMatchObject({
      ra: null,
      dec: null,
      airmass: null,
      altitude: null,
      cautions: ['no-coordinates'],
    });
  });

  it('says of a place below the horizon, and of one below the lowest pointing', async () => {
    expect(await log({ object: 'x', ra: 83.5, dec: -80 })).toMatchObject({
      airmass: null,
      cautions: ['below-horizon'],
    });
    const low = await log({ object: 'y', ra: 83.5, dec: -52 });
    expect(low.altitude).toBeGreaterThan(0);
    expect(low.cautions).toEqual(['below-pointing-limit']);
  });

  it('needs neither band nor object for a bias', async () => {
    const input = FrameInput.parse({ type: 'bias', utc_start: at('19:00:00'), exposure: 0 });
    const [frame] = await logFrames(noor, night.id, [input], single);
    expect(frame).toMatchObject({ type: 'bias', band: null, object: '', airmass: null, cautions: [] });
  });

  it('gives the next number under lock: twenty at once get twenty numbers', async () => {
    await freshNight();
    const frames = await Promise.all(
      Array.from({ length: 20 }, (_, index) =>
        logFrames(index % 2 ? noor : bram, night.id, [target()], single),
      ),
    );
    expect(
      frames
        .flat()
        .map(({ number }) => number)
        .sort((a, b) => a - b),
    ).toEqual(Array.from({ length: 20 }, (_, index) => index + 1));
  });

  it('asks whose frame it is when two programmes have a target of that name', async () => {
    await newProgramme('MH26B-30', 'Shared star', { ra: 80, decl: 20 });
    await newProgramme('MH26B-31', 'Shared star', { ra: 80, decl: 20 });
    const fault = await faultOf(log({ object: 'shared star' }));
    expect(fault.issues[0]).toMatchObject({ path: 'programme' });
    expect(fault.issues[0]?.message).toContain('MH26B-30 and MH26B-31');
    expect(await log({ object: 'shared star', programme: 'mh26b-31' })).toMatchObject({
      programme: 'MH26B-31',
      ra: 80,
    });
  });
});

describe('what a frame is refused for', () => {
  it.each([
    ['before the night', 'T11:59:59.999Z', 0],
    ['at its end', 'T12:00:00Z', 1],
  ])('a start %s, naming both times', async (_, clock, days) => {
    const date = new Date(Date.parse(`${night.date}T00:00:00Z`) + days * 86_400_000)
      .toISOString()
      .slice(0, 10);
    const fault = await faultOf(log({ utc_start: `${date}${clock}` }));
    expect(fault.code).toBe('invalid-input');
    expect(fault.issues).toEqual([
      {
        path: 'utc_start',
        value: `${date}${clock}`,
        message: `lies outside the night, which runs from ${night.starts_at} to ${night.ends_at}`,
      },
    ]);
  });

  it('takes a start at the first instant of the night', async () => {
    expect((await log({ utc_start: night.starts_at })).cautions).toContain('sun-up');
  });

  it('a band that the telescope has no filter for', async () => {
    await execute("DELETE FROM filters WHERE band = 'U'", {}, null);
    const fault = await faultOf(log({ band: 'U' }));
    expect(fault.issues).toEqual([
      { path: 'band', value: 'U', message: 'Larkspur 0.8 m has no filter for it: it has B, V, R, I' },
    ]);
  });

  it('a number and a file that the night has already, and a programme that is not there', async () => {
    const frame = await log({ file: 'n1.fits' });
    const fault = await faultOf(log({ number: frame.number, file: 'N1.FITS' }));
    expect(fault.issues.map(({ path, message }) => [path, message])).toEqual([
      ['number', 'is the number of a frame in the log'],
      ['file', `is the file of frame ${frame.number} in the log`],
    ]);
    expect((await faultOf(log({ programme: 'NO-1' }))).issues[0]).toMatchObject({
      path: 'programme',
      value: 'NO-1',
    });
  });

  it('an archived programme', async () => {
    const id = await newProgramme('MH20A-01', 'Old star', { ra: 1, decl: 1 });
    await execute('UPDATE programmes SET archived_at = NOW() WHERE id = :id', { id }, null);
    expect((await faultOf(log({ programme: 'MH20A-01' }))).issues[0]?.message).toContain('archived');
    // Its target's name gives nothing away any more.
    expect(await log({ object: 'Old star' })).toMatchObject({ programme: null, ra: null });
  });

  it('a closed night, saying who closed it and what to do', async () => {
    await freshNight();
    const frame = await log();
    await closeNight(noor, night.id, {});
    for (const work of [
      () => log(),
      () => correct(frame, { comment: 'x' }),
      () => removeFrame(noor, { night: night.id, frame: frame.id }, 'mistyped'),
    ]) {
      const fault = await faultOf(work());
      expect(fault.code).toBe('conflict');
      expect(fault.message).toMatch(/was closed by Noor Hathaway at .* UTC\. Open it again, with a reason/);
    }
    await freshNight();
  });

  it('somebody whose night it is not', async () => {
    const ilse = await newCaller('Ilse Brandt', { roles: ['observer'] });
    expect((await faultOf(logFrames(ilse, night.id, [target()], single))).code).toBe('not-allowed');
    const reader = await newCaller('Reader', { roles: ['photometrist'], scopes: ['read'] });
    expect((await faultOf(logFrames(reader, night.id, [target()], single))).code).toBe('not-allowed');
    const nobody = await newCaller('Nobody');
    expect((await faultOf(logFrames(nobody, night.id, [target()], single))).code).toBe('not-found');
  });
});

describe('many frames at once', () => {
  const start = (index: number): string => new Date(Date.parse(at('20:00:00')) + index * 6000).toISOString();

  it('logs 5,000 in a few seconds, numbered in order, and pages through them without loss', async () => {
    await freshNight();
    const begun = performance.now();
    const inputs = Array.from({ length: 5000 }, (_, index) =>
      target({ utc_start: start(index), file: `n${index}.fits`, band: index % 2 ? 'B' : 'V' }),
    );
    const frames = await logAll(inputs);
    const took_ms = performance.now() - begun;
    expect(frames.map(({ number }) => number)).toEqual(inputs.map((_, index) => index + 1));
    expect(frames[4999]?.file).toBe('n4999.fits');
    expect(took_ms).toBeLessThan(10_000);
    const seen: number[] = [];
    let after: string | undefined;
    do {
      const page = await nightFrames(noor, night.id, { limit: 700, after });
      seen.push(...page.items.map(({ number }) => number));
      after = page.next ?? undefined;
    } while (after !== undefined);
    expect(seen).toEqual(inputs.map((_, index) => index + 1));
  });

  it('logs none when one of them is wrong, and reports every fault by its index', async () => {
    await freshNight();
    const inputs = Array.from({ length: 200 }, (_, index) => target({ utc_start: start(index) }));
    inputs[17] = target({ utc_start: `2026-01-01T00:00:00Z` });
    inputs[50] = target({ programme: 'NO-1' });
    const fault = await faultOf(logAll(inputs));
    expect(fault.message).toBe('2 of 200 frames cannot be logged, so none was.');
    expect(fault.issues.map(({ path }) => path)).toEqual(['17.utc_start', '50.programme']);
    expect((await nightFrames(noor, night.id, { limit: 10 })).items).toEqual([]);
    expect(await trail(night.id)).toHaveLength(1);
  });

  it('logs none when two of them have one number or one file', async () => {
    const fault = await faultOf(
      logAll([
        target({ number: 5, file: 'a.fits' }),
        target({ number: 5, file: 'b.fits' }),
        target({ file: 'A.fits' }),
      ]),
    );
    expect(fault.issues.map(({ path, message }) => [path, message])).toEqual([
      ['1.number', 'stands twice in this list'],
      ['2.file', 'stands twice in this list'],
    ]);
    expect((await nightFrames(noor, night.id, { limit: 10 })).items).toEqual([]);
  });

  it('numbers what has no number after what has', async () => {
    const frames = await logAll([target(), target({ number: 10 }), target()]);
    expect(frames.map(({ number }) => number)).toEqual([1, 10, 11]);
    expect((await trail(night.id)).at(-1)).toMatchObject({
      act: 'frame.log',
      after: { frames: 3, lowest: 1, highest: 11 },
    });
  });

  it('tells no more than a thousand faults', async () => {
    const wrong = Array.from({ length: 1200 }, () => target({ utc_start: '2026-01-01T00:00:00Z' }));
    expect((await faultOf(logAll(wrong))).issues).toHaveLength(1000);
  });
});

describe('the next frame', () => {
  it('is a bias in an empty night', async () => {
    await freshNight();
    expect(await nextFrame(noor, night.id)).toMatchObject({ number: 1, type: 'bias', band: null });
  });

  it('repeats the last in the band that follows in the sequence, with that band’s exposure', async () => {
    await logAll([
      target({ band: 'B', exposure: 120 }),
      target({ band: 'V', exposure: 60 }),
      target({ band: 'B', exposure: 120 }),
    ]);
    expect(await nextFrame(noor, night.id)).toEqual({
      number: 4,
      type: 'target',
      object: 'Thistle 3',
      field: null,
      programme: 'MH26B-04',
      ra: 83.5,
      dec: 22.1,
      band: 'V',
      exposure: 60,
    });
  });
});
