import { readFile } from 'node:fs/promises';
import { beforeAll, describe, expect, it } from 'vitest';
import { database } from '@/db/connection';
import { Frame } from '@/db/models/frame';
import { MeasurementSet } from '@/db/models/measurement-set';
import { Night } from '@/db/models/night';
import { Person } from '@/db/models/person';
import { faults, repeatedRow } from '@/db/seeders/demo/sample-uploads';
import { seedDemo } from '@/db/seeders/demo/seed-demo';
import { fixturePath } from '@/db/seeders/fixture-files';
import { seedReference } from '@/db/seeders/reference';
import { tonightFiles } from '@/lib/contracts/demo-files';
import { select } from '@/lib/server/data/database';
import { callerOf } from '@/lib/server/identity/caller';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { readDemoFile } from '@/lib/server/storage/demo-files';
import { check, removeOriginals, setNow, upload } from '@/tests/support/measurements';

removeOriginals();

const options = { password: 'twilight flats', now: Date.parse('2026-12-01T23:00:00Z') };
let photometrist: PersonCaller;

const nightOf = async (date: string): Promise<string> =>
  (await Night.findOne({ where: { date }, rejectOnEmpty: true })).publicId;
const sample = (name: string): Promise<string> => readFile(fixturePath(`uploads/${name}`), 'utf8');
const linesOf = (text: string): number =>
  text.split('\n').filter((line) => line !== '' && !line.startsWith('#')).length - 1;

/** Uploads a table to a night, checks it and tells what became of it. */
async function take(night: string, content: string, query: Record<string, string> = {}) {
  const { set } = await upload(photometrist, await nightOf(night), content, query);
  await check({ set });
  return { set, ...(await setNow(set)) };
}

const faultsOf = (set: string) =>
  select<{ line: number; column: string | null; message: string }>(
    `SELECT f.line, f.column_name AS \`column\`, f.message FROM measurement_faults f
       JOIN measurement_sets m ON m.id = f.set_id WHERE m.public_id = :set ORDER BY f.seq`,
    { set },
  );

describe('the demo’s uploads', () => {
  beforeAll(async () => {
    await seedReference(database());
    await seedDemo(database(), options);
    const person = await Person.findOne({
      where: { email: 'photometrist@evenfall.example' },
      rejectOnEmpty: true,
    });
    const caller = await callerOf(person.id, { via: 'session', requestId: 'test' });
    if (caller === null) throw new Error('The demo’s photometrist cannot come in.');
    photometrist = caller;
  });

  it('both tables of the good nights and the standards of the cloudy one wait to be checked, and match whole', async () => {
    const sets = await MeasurementSet.findAll({ order: ['id'] });
    expect(sets.map(({ fileName, state }) => `${fileName} ${state}`)).toEqual([
      '2026-10-17-standards.csv received',
      '2026-10-17-targets.csv received',
      '2026-11-03-standards.csv received',
      '2026-11-03-targets.csv received',
      '2026-11-08-standards.csv received',
    ]);
    for (const { publicId, fileName } of sets) {
      await check({ set: publicId });
      const now = await setNow(publicId);
      const rows = linesOf(await sample(fileName));
      expect(now).toMatchObject({ state: 'matched', nRows: rows, measurements: rows, nFaults: 0 });
      expect(now.nMatched).toBe(fileName.includes('standards') ? rows : 0);
    }
  });

  it('loading the demo again uploads nothing twice', async () => {
    expect(await seedDemo(database(), options)).toContain('Tables uploaded: 0');
    expect(await MeasurementSet.count()).toBe(5);
  });

  it('the faulty table is refused, with a fault in each line that was spoilt and in no other', async () => {
    const faulty = await take('2026-11-03', await sample('2026-11-03-standards-faulty.csv'), {
      kind: 'standard',
    });
    expect(faulty).toMatchObject({ state: 'refused', measurements: 0 });
    const found = await faultsOf(faulty.set);
    const head = 3;
    const expected = [...faults.map(({ row }) => (row > repeatedRow ? row + 1 : row)), repeatedRow + 1];
    expect([...new Set(found.map(({ line }) => line - head))].toSorted((a, b) => a - b)).toEqual(
      expected.toSorted((a, b) => a - b),
    );
    expect(new Set(found.map(({ message }) => message)).size).toBeGreaterThanOrEqual(12);
  });

  it('the table with a mistaken star matches whole: only a fit can find the mistake', async () => {
    const set = await take('2026-11-03', await sample('2026-11-03-standards-misidentified.csv'), {
      kind: 'standard',
    });
    expect(set).toMatchObject({ state: 'matched', nFaults: 0 });
    expect(set.nMatched).toBe(set.nRows);
  });

  it('the table with other headers is refused as it is, and matches with a mapping', async () => {
    const content = await sample('2026-11-03-standards-other-headers.csv');
    expect((await take('2026-11-03', content, { kind: 'standard' })).state).toBe('refused');
    const mapping = {
      frame: 'Picture',
      star: 'Source',
      ra: 'Right ascension',
      dec: 'Declination',
      inst_mag: 'Magnitude',
      inst_err: 'Uncertainty',
      x: 'Column',
      y: 'Row',
      peak: 'Brightest pixel',
    };
    // Other bytes, or it would be recognised as the table that was refused.
    const set = await take('2026-11-03', `# once more\n${content}`, {
      kind: 'standard',
      mapping: JSON.stringify(mapping),
    });
    expect(set).toMatchObject({ state: 'matched', nFaults: 0 });
    expect(set.nMatched).toBe(set.nRows);
  });

  it('the programme stars of the cloudy night match its frames', async () => {
    const set = await take('2026-11-08', await sample('2026-11-08-targets.csv'), { kind: 'target' });
    expect(set).toMatchObject({ state: 'matched', nFaults: 0, nMatched: 0 });
  });

  it('the tables of the night in progress match, and the one with new frames fills the hole in its log', async () => {
    const tonight = await Night.findOne({ where: { state: 'open' }, rejectOnEmpty: true });
    for (const [name, kind] of [
      [tonightFiles.standards, 'standard'],
      [tonightFiles.targets, 'target'],
    ] as const) {
      const content = (await readDemoFile(name))?.toString('utf8') ?? '';
      const set = await take(tonight.date, content, { kind });
      expect(set).toMatchObject({ state: 'matched', nFaults: 0, nFramesCreated: 0 });
    }
    const before = await Frame.count({ where: { nightId: tonight.id } });
    const content = (await readDemoFile(tonightFiles.newFrames))?.toString('utf8') ?? '';
    const set = await take(tonight.date, content, { kind: 'standard' });
    expect(set).toMatchObject({ state: 'matched', nFaults: 0 });
    expect(set.nFramesCreated).toBeGreaterThan(1);
    expect(set.nMatched).toBe(set.nRows);
    const frames = await Frame.findAll({ where: { nightId: tonight.id }, order: ['number'] });
    expect(frames).toHaveLength(before + set.nFramesCreated);
    // The hole is closed: numbers run from 1 without a gap.
    expect(frames.map(({ number }) => number)).toEqual(frames.map((_frame, index) => index + 1));
  });
});
