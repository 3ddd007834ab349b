import { beforeAll, describe, expect, it } from 'vitest';
import { FrameInput, type Frame } from '@/lib/contracts/api/frame';
import type { Night } from '@/lib/contracts/api/night';
import { isFault } from '@/lib/faults/fault';
import { correctFrame } from '@/lib/server/acts/correct-frame';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { removeFrame } from '@/lib/server/acts/remove-frame';
import { execute, insert, select } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { nightFrames } from '@/lib/server/reads/night-frames';
import { faultOf } from '../../support/fault-of';
import { newCaller, newLogWorld, newStandards } from '../../support/log-world';

let noor: PersonCaller;
let bram: PersonCaller;
let night: Night;
let day = 1;

const single = { origin: 'log', isList: false } as const;
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

describe('correcting a frame', () => {
  it('keeps the earlier values in the audit trail and derives the geometry anew', async () => {
    await freshNight();
    const frame = await log();
    const corrected = await correct(frame, {
      utc_start: at('22:00:00'),
      exposure: 120,
      reason: 'clock was an hour off',
    });
    expect(corrected).toMatchObject({ version: 2, utc_mid: `${night.date}T22:01:00.000Z`, exposure: 120 });
    expect(corrected.hour_angle).not.toBe(frame.hour_angle);
    const last = (await trail(frame.id)).at(-1);
    expect(last).toMatchObject({
      act: 'frame.correct',
      reason: 'clock was an hour off',
      before: { utc_start: frame.utc_start, exposure: 60, airmass: frame.airmass },
      after: { utc_start: corrected.utc_start, exposure: 120, airmass: corrected.airmass },
    });
    // Only what changed is told.
    expect(Object.keys(last?.before ?? {})).not.toContain('object');
  });

  it('moves coordinates and programme with a corrected object', async () => {
    const frame = await log({ object: 'LV Marrow' });
    expect(frame.programme).toBe('MH26B-11');
    expect(await correct(frame, { object: 'Thistle 3' })).toMatchObject({
      programme: 'MH26B-04',
      ra: 83.5,
      dec: 22.1,
    });
  });

  it('keeps coordinates when the new name is not known, and when only the programme changes', async () => {
    const frame = await log({ object: 'LV Marow', ra: 12.2, dec: 41.1 });
    const renamed = await correct(frame, { object: 'LV Marrow B' });
    expect(renamed).toMatchObject({ ra: 12.2, dec: 41.1, programme: null });
    expect(await correct(renamed, { programme: 'MH26B-11' })).toMatchObject({
      ra: 12.2,
      programme: 'MH26B-11',
    });
  });

  it('refuses who has not seen the present version, with the present values', async () => {
    const frame = await log();
    await correct(frame, { comment: 'cloud', exposure: 90 }, bram);
    const fault = await faultOf(correct(frame, { exposure: 30 }));
    expect(fault.code).toBe('stale');
    expect(fault.message).toContain('Bram Oyelaran');
    expect(fault.issues).toEqual([
      { path: 'exposure', value: '90', message: 'is the present value' },
      { path: 'version', value: '2', message: 'is the present version' },
    ]);
  });

  it('lets one of two win who correct one frame at once', async () => {
    const frame = await log();
    const both = await Promise.allSettled([
      correct(frame, { comment: 'a' }),
      correct(frame, { comment: 'b' }, bram),
    ]);
    expect(both.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    expect(both.some((result) => result.status === 'rejected' && isFault(result.reason, 'stale'))).toBe(true);
  });

  it.each([
    ['a start outside the night', { utc_start: '2026-01-01T00:00:00Z' }, 'utc_start'],
    ['a target without a band', { band: null }, 'band'],
    ['one coordinate without the other', { ra: 10, dec: null }, 'dec'],
    ['an unknown programme', { programme: 'NO-1' }, 'programme'],
    ['the number of another frame', { number: 1 }, 'number'],
  ])('refuses %s', async (_, patch, path) => {
    const frame = await log();
    const fault = await faultOf(correct(frame, patch));
    expect(fault.code).toBe('invalid-input');
    expect(fault.issues.map((issue) => issue.path)).toContain(path);
  });

  it('refuses a frame of another night', async () => {
    const frame = await log();
    await freshNight();
    expect((await faultOf(correct(frame, { comment: 'x' }))).code).toBe('not-found');
  });
});

describe('correcting the exposure of a frame that was measured', () => {
  async function measured(mapping: object, state = 'matched') {
    const frame = await log();
    const [row] = await select<{ id: number; night: number }>(
      'SELECT id, night_id AS night FROM frames WHERE public_id = :id',
      { id: frame.id },
    );
    const set = await insert(
      `INSERT INTO measurement_sets (public_id, night_id, kind, name, state, file_name, content_type, size, sha256, tolerance, mapping, comments, uploaded_by_id)
       VALUES (:publicId, :night, 'target', 'cluster', :state, 'a.csv', 'text/csv', 1, :sha, 2, :mapping, '', :person)`,
      {
        publicId: newPublicId(),
        night: row?.night ?? 0,
        state,
        sha: 'a'.repeat(64),
        mapping: JSON.stringify(mapping),
        person: noor.personId,
      },
      null,
    );
    const values = { set, frame: row?.id ?? 0, other: (row?.id ?? 0) + 1000 };
    await execute(
      'INSERT INTO measurement_set_frames (set_id, frame_id, n_rows) VALUES (:set, :frame, 1)',
      values,
      null,
    );
    await execute(
      `INSERT INTO measurements (set_id, row_no, frame_id, star_no, inst_mag, inst_err)
       VALUES (:set, 1, :frame, 1, 14, 0.01), (:set, 2, :other, 1, 15, 0.01)`,
      values,
      null,
    );
    const magnitudes = async (): Promise<readonly number[]> =>
      (
        await select<{ mag: number }>(
          'SELECT inst_mag AS mag FROM measurements WHERE set_id = :set ORDER BY row_no',
          values,
        )
      ).map(({ mag }) => mag);
    return { frame, magnitudes };
  }

  it('takes magnitudes that were made from counts along: they are of counts per second', async () => {
    const { frame, magnitudes } = await measured({ frame: 'frame', flux: 'flux', flux_err: 'flux_err' });
    await correct(frame, { exposure: 600 });
    // Ten times the exposure for the same counts: 2.5 mag fainter.
    expect(await magnitudes()).toEqual([16.5, 15]);
    await correct({ ...frame, version: 2 }, { comment: 'checked' });
    expect(await magnitudes()).toEqual([16.5, 15]);
  });

  it('leaves magnitudes that were given as they are', async () => {
    const { frame, magnitudes } = await measured({ frame: 'frame', inst_mag: 'inst_mag' });
    await correct(frame, { exposure: 600 });
    expect(await magnitudes()).toEqual([14, 15]);
  });

  it.each([
    ['a solution stands on magnitudes from counts', { flux: 'flux' }, 'in use', 'a solution stands on it'],
    [
      'counts and magnitudes stand beside each other',
      { flux: 'flux', inst_mag: 'm' },
      'matched',
      'not known which rows',
    ],
  ])('is refused where %s', async (_, mapping, state, words) => {
    const { frame, magnitudes } = await measured(mapping, state);
    const fault = await faultOf(correct(frame, { exposure: 600 }));
    expect(fault.code).toBe('conflict');
    expect(fault.message).toContain(words);
    expect(await magnitudes()).toEqual([14, 15]);
    expect((await correct(frame, { comment: 'hazy' })).comment).toBe('hazy');
  });
});

describe('withdrawing a frame', () => {
  const remove = (frame: Frame, reason = 'logged twice'): Promise<void> =>
    removeFrame(noor, { night: night.id, frame: frame.id }, reason);

  it('keeps the whole frame and the reason in the audit trail', async () => {
    const frame = await log({ comment: 'mistyped' });
    await remove(frame);
    expect((await nightFrames(noor, night.id, { limit: 100 })).items.map(({ id }) => id)).not.toContain(
      frame.id,
    );
    expect((await trail(frame.id)).at(-1)).toMatchObject({
      act: 'frame.remove',
      reason: 'logged twice',
      before: frame,
    });
  });

  it('is refused once something was measured on it, naming the set', async () => {
    const frame = await log();
    const [row] = await select<{ id: number; night: number }>(
      'SELECT id, night_id AS night FROM frames WHERE public_id = :id',
      {
        id: frame.id,
      },
    );
    const set = await insert(
      `INSERT INTO measurement_sets (public_id, night_id, kind, name, file_name, content_type, size, sha256, tolerance, mapping, comments, uploaded_by_id)
       VALUES (:publicId, :night, 'target', 'cluster, V', 'a.csv', 'text/csv', 1, :sha, 2, '{}', '', :person)`,
      { publicId: newPublicId(), night: row?.night ?? 0, sha: 'a'.repeat(64), person: noor.personId },
      null,
    );
    await execute(
      'INSERT INTO measurement_set_frames (set_id, frame_id, n_rows) VALUES (:set, :frame, 1)',
      { set, frame: row?.id ?? 0 },
      null,
    );
    const fault = await faultOf(remove(frame));
    expect(fault.code).toBe('conflict');
    expect(fault.message).toContain('“cluster, V”');
  });
});
