import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Night } from '@/lib/contracts/api/night';
import { FrameInput } from '@/lib/contracts/api/frame';
import { closeNight } from '@/lib/server/acts/close-night';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { select, selectOne } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { newCaller, newLogWorld, newStandards } from '@/tests/support/log-world';
import {
  check,
  filesIn,
  mailsOf,
  originalBytes,
  removeOriginals,
  setNow,
  upload,
} from '@/tests/support/measurements';

removeOriginals();
let noor: PersonCaller;
let bram: PersonCaller;
let day = 1;

beforeAll(async () => {
  await newLogWorld();
  await newStandards();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
});

/** A night of its own with two frames, V and B. */
async function newNight(): Promise<Night> {
  const date = `2026-03-${String(day++).padStart(2, '0')}`;
  const night = await openNight(noor, { telescope: 'larkspur', date });
  const frame = (band: string, minute: string): FrameInput =>
    FrameInput.parse({
      type: 'standard',
      object: 'ZZ 1',
      band,
      utc_start: `${date}T21:${minute}:00Z`,
      exposure: 40,
      file: `${date}_${band}.fits`,
    });
  await logFrames(noor, night.id, [frame('V', '00'), frame('B', '05')], { origin: 'log', isList: true });
  return night;
}

const header = 'frame,star,ra,dec,inst_mag,inst_err,x,flag';
const good = `# run 7\n${header}\n1,ZZ 1 A,359.5,10,-7.5,0.01,12.5,edge\n2,zz1b,,,-7.25,0.02,,\n1,Other,80,5,-3,0.1,,edge\n`;

describe('checking a good table', () => {
  it('loads every row with its frame, star and flag, and says what matched', async () => {
    const night = await newNight();
    const { set } = await upload(noor, night.id, good);
    expect(await check({ set })).toEqual({ set, state: 'matched', rows: 3, matched: 2, faults: 0 });
    const now = await setNow(set);
    expect(now).toMatchObject({
      state: 'matched',
      nRows: 3,
      nMatched: 2,
      comments: 'run 7',
      measurements: 3,
      stars: 3,
      flags: 1,
      faults: 0,
      frames: 2,
    });
    expect(now.mapping).toMatchObject({ frame: 'frame', inst_mag: 'inst_mag' });
    const rows = await select(
      `SELECT r.row_no, f.number, s.name, d.name AS standard, s.matched_by, s.first_line, r.inst_mag, r.inst_err, r.ra, r.decl, r.x, r.y, g.text
         FROM measurements r JOIN frames f ON f.id = r.frame_id
         JOIN measurement_stars s ON s.set_id = r.set_id AND s.star_no = r.star_no
         LEFT JOIN standard_stars d ON d.id = s.standard_id
         LEFT JOIN measurement_flags g ON g.set_id = r.set_id AND g.flag_no = r.flag_no
        WHERE r.set_id = :id ORDER BY r.row_no`,
      { id: now.id },
    );
    expect(rows.map((row) => Object.values(row))).toEqual([
      [1, 1, 'ZZ 1 A', 'ZZ 1 A', 'name', 3, -7.5, 0.01, 359.5, 10, 12.5, null, 'edge'],
      [2, 2, 'zz1b', 'ZZ 1 B', 'name', 4, -7.25, 0.02, null, null, null, null, null],
      [3, 1, 'Other', null, null, 5, -3, 0.1, 80, 5, null, null, 'edge'],
    ]);
    expect(await filesIn('work')).toEqual([]);
  });

  it('keeps the original byte for byte under its hash', async () => {
    const night = await newNight();
    const content = Buffer.from(`\ufeff${good.replaceAll('\n', '\r\n')}`);
    const { set } = await upload(noor, night.id, content);
    await check({ set });
    const row = await selectOne<{ sha256: string; size: number }>(
      'SELECT sha256, size FROM measurement_sets WHERE public_id = :set',
      { set },
    );
    expect(row).toEqual({ sha256: createHash('sha256').update(content).digest('hex'), size: content.length });
    expect(originalBytes(row?.sha256 ?? '').equals(content)).toBe(true);
  });

  it('tells the photometrists that measurements wait, each once, however often it is run', async () => {
    const before = (await mailsOf('measurements-waiting')).length;
    const night = await newNight();
    const { set } = await upload(noor, night.id, good, { name: 'Evening run' });
    const first = await check({ set });
    expect(await check({ set })).toEqual(first);
    const mails = (await mailsOf('measurements-waiting')).slice(before);
    expect(mails.map(({ recipient }) => recipient)).toEqual([bram.email]);
    expect(mails[0]?.subject).toContain('March 2026, Larkspur 0.8 m');
    expect(await setNow(set)).toMatchObject({ measurements: 3, state: 'matched' });
  });

  it('creates the frames that the log does not have, with geometry, and loads rows onto them', async () => {
    const night = await newNight();
    const at = (minute: string): string => `${night.date}T22:${minute}:00Z`;
    const content =
      'frame,star,ra,dec,flux,flux_err,utc_start,exposure,band,type\n' +
      `7,ZZ 1 A,359.5,10,6000,60,${at('00')},60,V,\n7,ZZ 1 B,0.5,10,600,6,,,,\nlk_x.fits,a,83.6,22.2,50,5,${at('10')},30,R,target\n1,ZZ 1 A,,,4000,40,,,,\n`;
    const { set } = await upload(noor, night.id, content, { kind: 'mixed', name: 'With frames' });
    expect(await check({ set })).toMatchObject({ state: 'matched', rows: 4, matched: 3 });
    expect(await setNow(set)).toMatchObject({ nFramesCreated: 2, frames: 3, measurements: 4 });
    const frames = await select<Record<string, unknown>>(
      `SELECT f.number, f.file, f.type, f.object, f.field, p.code, f.band, f.exposure, f.origin, f.ra, f.decl, f.airmass, f.comment,
              (SELECT GROUP_CONCAT(r.inst_mag ORDER BY r.row_no) FROM measurements r WHERE r.frame_id = f.id) AS mags
         FROM frames f JOIN nights n ON n.id = f.night_id LEFT JOIN programmes p ON p.id = f.programme_id
        WHERE n.public_id = :night AND f.origin = 'upload' ORDER BY f.number`,
      { night: night.id },
    );
    expect(frames).toEqual([
      {
        number: 7,
        file: null,
        type: 'standard',
        object: 'ZZ 1',
        field: 'ZZ 1',
        code: null,
        band: 'V',
        exposure: 60,
        origin: 'upload',
        ra: expect.closeTo(0, 6) as number,
        decl: expect.closeTo(10, 2) as number,
        airmass: null,
        comment: 'from upload: With frames',
        mags: '-5,-2.5',
      },
      expect.objectContaining({
        number: 8,
        file: 'lk_x.fits',
        type: 'target',
        object: 'Thistle 3',
        code: 'MH26B-04',
        airmass: expect.any(Number) as number,
      }),
    ]);
  });

  it('reads other headers by the mapping that came with the upload', async () => {
    const night = await newNight();
    const mapping = JSON.stringify({ frame: 'IMAGE', star: 'NAME', inst_mag: 'MAG', inst_err: 'ERR' });
    const { set } = await upload(noor, night.id, 'image,name,mag,err\n1,ZZ 1 A,-7,0.1\n', { mapping });
    expect(await check({ set })).toMatchObject({ state: 'matched', rows: 1 });
    expect((await setNow(set)).mapping).toEqual({
      frame: 'image',
      star: 'name',
      inst_mag: 'mag',
      inst_err: 'err',
    });
  });
});

describe('checking a faulty table', () => {
  it('loads nothing, keeps every fault with its place, and tells the uploader once', async () => {
    const before = (await mailsOf('upload-refused')).length;
    const night = await newNight();
    const rows = '1,ZZ 1 A,,,-7.5,0.01,,\n1,B,,,NaN,0.01,,\n9,C,,,-7,0,,\n';
    const { set } = await upload(noor, night.id, `${header}\n${rows}`);
    expect(await check({ set })).toEqual({ set, state: 'refused', rows: 3, matched: 0, faults: 3 });
    expect(await check({ set })).toEqual({ set, state: 'refused', rows: 3, matched: 0, faults: 3 });
    const now = await setNow(set);
    expect(now).toMatchObject({
      state: 'refused',
      nFaults: 3,
      measurements: 0,
      stars: 0,
      flags: 0,
      frames: 0,
      faults: 3,
    });
    const faults = await select(
      'SELECT line, column_name, value, message FROM measurement_faults WHERE set_id = :id ORDER BY seq',
      { id: now.id },
    );
    expect(faults.map((fault) => Object.values(fault))).toEqual([
      [3, 'inst_mag', 'NaN', 'This is not a finite number.'],
      [4, 'inst_err', '0', 'A standard error is greater than 0.'],
      [4, 'frame', '9', 'This frame is not in the night log.'],
    ]);
    const mails = (await mailsOf('upload-refused')).slice(before);
    expect(mails.map(({ recipient }) => recipient)).toEqual([noor.email]);
    expect(await filesIn('work')).toEqual([]);
  });

  it('creates no frame of a table that is refused', async () => {
    const night = await newNight();
    const content = `frame,star,inst_mag,inst_err,utc_start,exposure,band\n7,A,-7,0.1,${night.date}T22:00:00Z,60,V\n7,A,-7,0.1,,,\n`;
    const { set } = await upload(noor, night.id, content);
    expect(await check({ set })).toMatchObject({ state: 'refused', faults: 1 });
    const frames = await select(
      'SELECT f.number FROM frames f JOIN nights n ON n.id = f.night_id WHERE n.public_id = :id',
      { id: night.id },
    );
    expect(frames).toHaveLength(2);
  });

  it('refuses frames for a night that was closed, and says so', async () => {
    const night = await newNight();
    await closeNight(noor, night.id, {});
    const content = `frame,star,inst_mag,inst_err,utc_start,exposure,band\n7,A,-7,0.1,${night.date}T22:00:00Z,60,V\n1,A,-7,0.1,,,\n`;
    const { set } = await upload(noor, night.id, content);
    expect(await check({ set })).toMatchObject({ state: 'refused', faults: 1 });
  });
});
