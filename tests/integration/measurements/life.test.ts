import { beforeAll, describe, expect, it } from 'vitest';
import { FrameInput } from '@/lib/contracts/api/frame';
import type { Night } from '@/lib/contracts/api/night';
import { isFault, type FaultCode } from '@/lib/faults/fault';
import { checkMeasurementsAgain } from '@/lib/server/acts/check-measurements-again';
import { loadMeasurements } from '@/lib/server/acts/load-measurements';
import { logFrames } from '@/lib/server/acts/log-frames';
import { markSetChecked } from '@/lib/server/acts/mark-set-checked';
import { openNight } from '@/lib/server/acts/open-night';
import { refuseMeasurements } from '@/lib/server/acts/refuse-measurements';
import { saveColumnMapping } from '@/lib/server/acts/save-column-mapping';
import { checkFrames } from '@/lib/server/data/check-inputs';
import { execute, select, selectOne } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { columnMappings } from '@/lib/server/reads/column-mappings';
import { system } from '@/tests/support/jobs';
import { newCaller, newLogWorld, newStandards } from '@/tests/support/log-world';
import { check, filesIn, mailsOf, removeOriginals, setNow, upload } from '@/tests/support/measurements';

removeOriginals();
let noor: PersonCaller;
let ilse: PersonCaller;
let bram: PersonCaller;
let day = 1;

beforeAll(async () => {
  await newLogWorld();
  await newStandards();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  ilse = await newCaller('Ilse Brandt', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
});

/** A night of its own with one frame in V. */
async function newNight(): Promise<Night> {
  const date = `2026-04-${String(day++).padStart(2, '0')}`;
  const night = await openNight(noor, { telescope: 'larkspur', date });
  const frame = FrameInput.parse({
    type: 'standard',
    object: 'SA 98',
    band: 'V',
    utc_start: `${date}T21:00:00Z`,
    exposure: 40,
  });
  await logFrames(noor, night.id, [frame], { origin: 'log', isList: false });
  return night;
}

const header = 'frame,star,inst_mag,inst_err';
const small = `${header}\n1,SA 98-1,-7,0.01\n`;
/** Enough rows for several slices. */
const large = `${header}\n${Array.from({ length: 150_000 }, (_, row) => `1,star ${row},-7.125,0.0125`).join('\n')}\n`;

async function codeOf(work: Promise<unknown>): Promise<FaultCode> {
  try {
    await work;
  } catch (error) {
    if (isFault(error)) return error.code;
    throw error;
  }
  throw new Error('It went through.');
}

describe('the same bytes twice', () => {
  it('are recognised in one night, and the earlier set is named', async () => {
    const night = await newNight();
    const { set } = await upload(noor, night.id, small, { name: 'First' });
    const again = upload(bram, night.id, small, { name: 'Second' });
    await expect(again).rejects.toMatchObject({
      code: 'conflict',
      message: `This file was uploaded to this night before, as the set “First” (${set}).`,
      issues: [{ path: 'set', value: set }],
    });
  });

  it('are taken again where the earlier set was refused, and in another night', async () => {
    const [night, other] = [await newNight(), await newNight()];
    const faulty = `${header}\n1,A,NaN,0.01\n`;
    const { set } = await upload(noor, night.id, faulty);
    await check({ set });
    expect((await upload(noor, night.id, faulty)).set).not.toBe(set);
    expect((await upload(noor, other.id, faulty)).set).not.toBe(set);
  });

  it('at one moment are one set and one job', async () => {
    const night = await newNight();
    const all = await Promise.allSettled(Array.from({ length: 4 }, () => upload(noor, night.id, small)));
    expect(all.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    const jobs = await select(
      `SELECT j.id FROM jobs j JOIN nights n ON n.id = j.night_id WHERE n.public_id = :id AND j.kind = 'check-measurements'`,
      { id: night.id },
    );
    expect(jobs).toHaveLength(1);
  });
});

describe('a check that ends in its middle', { timeout: 60_000 }, () => {
  it('leaves nothing of the table, and comes to its end when it is run again', async () => {
    const before = (await mailsOf('measurements-waiting')).length;
    const night = await newNight();
    const { set } = await upload(noor, night.id, large);
    // The runner's process dies while rows are in the database and the transaction is open.
    const dies = check({
      set,
      progress: (_, message) => {
        if (message.startsWith('Loading')) throw new Error('killed');
      },
    });
    await expect(dies).rejects.toThrow('killed');
    const half = await setNow(set);
    expect(half).toMatchObject({ measurements: 0, stars: 0, frames: 0, nMatched: null });
    expect(['received', 'checked']).toContain(half.state);
    expect(await filesIn('work')).toEqual([]);
    expect(await check({ set })).toMatchObject({ state: 'matched', rows: 150_000 });
    expect(await setNow(set)).toMatchObject({ state: 'matched', measurements: 150_000, stars: 150_000 });
    expect(await mailsOf('measurements-waiting')).toHaveLength(before + 1);
  });

  it('by cancelling leaves nothing either, and can be started again', async () => {
    const night = await newNight();
    const { set, job } = await upload(noor, night.id, large);
    const stop = new AbortController();
    const stopped = check({
      set,
      signal: stop.signal,
      progress: () => stop.abort(new Error('cancelled')),
    });
    await expect(stopped).rejects.toThrow('cancelled');
    expect(await setNow(set)).toMatchObject({ measurements: 0, stars: 0 });
    expect(await codeOf(checkMeasurementsAgain(noor, set))).toBe('conflict');
    await execute(
      `UPDATE jobs SET state = 'cancelled', dedupe_key = NULL, finished_at = NOW(3) WHERE public_id = :job`,
      { job },
      null,
    );
    const queued = await checkMeasurementsAgain(noor, set);
    expect(queued.set).toBe(set);
    expect(queued.job).not.toBe(job);
    expect(await codeOf(checkMeasurementsAgain(noor, set))).toBe('conflict');
  });

  it('with a fault in the last row undoes the rows that were loaded before it was found', async () => {
    const night = await newNight();
    const { set } = await upload(noor, night.id, `${large}1,last,NaN,0.1\n`);
    expect(await check({ set })).toMatchObject({ state: 'refused', rows: 150_001, faults: 1 });
    expect(await setNow(set)).toMatchObject({
      state: 'refused',
      measurements: 0,
      stars: 0,
      frames: 0,
      faults: 1,
    });
  });
});

describe('loading a checked table', () => {
  it('is refused as stale when a frame that it names has changed since the check began', async () => {
    const night = await newNight();
    const { set } = await upload(noor, night.id, small);
    const { id } = (await selectOne<{ id: number }>('SELECT id FROM nights WHERE public_id = :id', {
      id: night.id,
    })) ?? {
      id: 0,
    };
    const seen = await checkFrames(id);
    const result = { rows: 1, comments: '', columns: {}, faults: [], nFaults: 0 };
    const load = {
      slices: [],
      stars: [],
      flags: [],
      matchedRows: 0,
      newFrames: [],
      usedFrames: seen.map((frame) => ({ frame: frame.id, rows: 1 })),
    };
    await markSetChecked(system, set, result);
    await execute('UPDATE frames SET exposure = 41 WHERE night_id = :id', { id }, null);
    const work = loadMeasurements(system, set, {
      slices: (async function* () {})(),
      result: Promise.resolve({ ...result, load }),
      seen,
      onRows: () => undefined,
    });
    expect(await codeOf(work)).toBe('stale');
    expect(await setNow(set)).toMatchObject({ state: 'checked', frames: 0 });
  });

  it('takes numbers however CSV writes them', async () => {
    const night = await newNight();
    const numbers = ['+5', '.5', '5.', '-.5', '1e1', '2.5E-1', '005'];
    const rows = numbers.map((number, index) => `1,S${index},${number},0.1,${number}`).join('\n');
    const { set } = await upload(noor, night.id, `${header},x\n${rows}\n`);
    expect(await check({ set })).toMatchObject({ state: 'matched', rows: 7 });
    const stored = await select<{ mag: number; x: number }>(
      `SELECT r.inst_mag AS mag, r.x FROM measurements r JOIN measurement_sets m ON m.id = r.set_id
        WHERE m.public_id = :set ORDER BY r.row_no`,
      { set },
    );
    expect(stored.map(({ mag }) => mag)).toEqual([5, 0.5, 5, -0.5, 10, 0.25, 5]);
    expect(stored.map(({ x }) => x)).toEqual([5, 0.5, 5, -0.5, 10, 0.25, 5]);
  });

  it('takes names with tabs’ stand-ins, backslashes and every script', async () => {
    const night = await newNight();
    const names = ['a\\tb', '\\N', 'ζ Ori', '"x"', '星', 'a,b'];
    const rows = names.map((name) => `1,"${name.replaceAll('"', '""')}",-7,0.1`).join('\n');
    const { set } = await upload(noor, night.id, `${header}\n${rows}\n`);
    expect(await check({ set })).toMatchObject({ state: 'matched', rows: 6 });
    const stars = await select<{ name: string }>(
      `SELECT s.name FROM measurement_stars s JOIN measurement_sets m ON m.id = s.set_id
        WHERE m.public_id = :set ORDER BY s.star_no`,
      { set },
    );
    expect(stars.map(({ name }) => name)).toEqual(names);
  });
});

describe('taking a set back', () => {
  it('removes its rows, keeps the reason and lets the same file come again', async () => {
    const night = await newNight();
    const { set } = await upload(noor, night.id, small);
    await check({ set });
    await refuseMeasurements(noor, set, 'the wrong aperture');
    expect(await setNow(set)).toMatchObject({
      state: 'refused',
      measurements: 0,
      stars: 0,
      frames: 0,
      nFaults: 0,
    });
    const [why] = await select<{ message: string }>(
      `SELECT f.message FROM measurement_faults f JOIN measurement_sets m ON m.id = f.set_id WHERE m.public_id = :set`,
      { set },
    );
    expect(why?.message).toBe('Taken back by Noor Hathaway: the wrong aperture');
    expect(await codeOf(refuseMeasurements(noor, set, 'once more'))).toBe('conflict');
    expect((await upload(noor, night.id, small)).set).not.toBe(set);
  });

  it('is for photometrists and whoever uploaded it', async () => {
    const night = await newNight();
    const { set } = await upload(bram, night.id, small);
    await check({ set });
    expect(await codeOf(refuseMeasurements(noor, set, 'not mine'))).toBe('not-allowed');
    expect(await codeOf(refuseMeasurements(ilse, set, 'not mine'))).toBe('not-found');
    await refuseMeasurements(bram, set, 'a better one follows');
    expect(await setNow(set)).toMatchObject({ state: 'refused' });
  });
});

describe('column mappings', () => {
  it('are remembered for the telescope, and read the next table with the same headers', async () => {
    const night = await newNight();
    const mapping = { frame: 'Picture', star: 'Source', inst_mag: 'M', inst_err: 'dM' };
    const headers = ['Picture', 'Source', 'M', 'dM'];
    await saveColumnMapping(noor, night.id, { headers, mapping });
    await saveColumnMapping(bram, night.id, { headers, mapping });
    const { items } = await columnMappings(noor, night.id);
    expect(items).toMatchObject([{ headers, mapping, saved_by: 'Bram Oyelaran' }]);
    const other = await newNight();
    const { set } = await upload(noor, other.id, 'PICTURE,source,m,dm\n1,SA 98-1,-7,0.01\n');
    expect(await check({ set })).toMatchObject({ state: 'matched', matched: 1 });
  });

  it('name headers that are there, each for one column', async () => {
    const night = await newNight();
    const save = saveColumnMapping(noor, night.id, {
      headers: ['a', 'b'],
      mapping: { frame: 'a', star: 'A', inst_mag: 'c' },
    });
    await expect(save).rejects.toMatchObject({
      code: 'invalid-input',
      issues: [
        { path: 'mapping.star', value: 'A' },
        { path: 'mapping.inst_mag', value: 'c' },
      ],
    });
  });

  it('are for those who may upload to the night', async () => {
    const night = await newNight();
    const input = { headers: ['a'], mapping: { frame: 'a' } };
    expect(await codeOf(saveColumnMapping(ilse, night.id, input))).toBe('not-allowed');
  });
});
