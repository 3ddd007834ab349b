import { beforeAll, describe, expect, it } from 'vitest';
import { database } from '@/db/connection';
import { Frame } from '@/db/models/frame';
import { Night } from '@/db/models/night';
import { Observatory } from '@/db/models/observatory';
import { Person } from '@/db/models/person';
import { PersonRole } from '@/db/models/person-role';
import { Programme } from '@/db/models/programme';
import { ProgrammeMember } from '@/db/models/programme-member';
import { seedDemo } from '@/db/seeders/demo/seed-demo';
import { frameGeometry } from '@/lib/astro/frame-geometry';
import { select } from '@/lib/server/data/database';
import { passwordMatches } from '@/lib/server/identity/password';
import { emptyTables } from '@/tests/support/database';
import { removeOriginals } from '@/tests/support/measurements';
import { expectWithin } from '@/tests/support/numbers';

removeOriginals();

const password = 'twilight flats';
/** Ten in the evening on Marrow Hill. */
const now = Date.parse('2026-12-01T22:00:00Z');
const site = { longitude: -17.25, latitude: 28.31, elevation: 2300 };

const nightOf = (date: string): Promise<Night> => Night.findOne({ where: { date }, rejectOnEmpty: true });
const framesOf = async (date: string): Promise<readonly Frame[]> =>
  Frame.findAll({ where: { nightId: (await nightOf(date)).id }, order: ['number'] });

describe('the demo', () => {
  beforeAll(async () => {
    await emptyTables();
    await seedDemo(database(), { password, now });
  });

  it('is marked as a demo, with one account for each role, all with the demo password', async () => {
    expect((await Observatory.findOne({ rejectOnEmpty: true })).get()).toMatchObject({
      name: 'Marrow Hill Observatory',
      isDemo: true,
    });
    const people = await Person.findAll();
    expect(people.map(({ email }) => email).toSorted()).toEqual(
      ['coinvestigator', 'manager', 'observer', 'photometrist', 'photometrist2', 'pi']
        .map((name) => `${name}@evenfall.example`)
        .toSorted(),
    );
    for (const { passwordHash } of people) expect(await passwordMatches(passwordHash, password)).toBe(true);
    expect((await PersonRole.findAll()).map(({ role }) => role).toSorted()).toEqual([
      'manager',
      'observer',
      'photometrist',
      'photometrist',
    ]);
    expect(await ProgrammeMember.count()).toBe(4);
  });

  it('has two good nights and a cloudy one, all closed, and one in progress that is open', async () => {
    const nights = await Night.findAll({ order: ['date'] });
    expect(nights.map(({ date, state }) => `${date} ${state}`)).toEqual([
      '2026-10-17 closed',
      '2026-11-03 closed',
      '2026-11-08 closed',
      '2026-12-01 open',
    ]);
    const clouds = async (night: Night): Promise<number | undefined> => {
      const [row] = await select<{ cloud: number }>(
        'SELECT MAX(cloud) AS cloud FROM conditions WHERE night_id = :night',
        { night: night.id },
      );
      return row?.cloud;
    };
    expect(await Promise.all(nights.map(clouds))).toEqual([0, 0, 8, 0]);
  });

  it('the night in progress holds frames up to now, and none later', async () => {
    const frames = await framesOf('2026-12-01');
    const last = Math.max(...frames.map(({ utcStart }) => utcStart.getTime()));
    expect(frames.length).toBeGreaterThan(30);
    expect(last).toBeLessThanOrEqual(now);
    expect(now - last).toBeLessThan(60 * 60_000);
  });

  it.each(['2026-10-17', '2026-11-03', '2026-11-08', '2026-12-01'])(
    'frames of the night %s follow each other, point at the sky and carry their geometry',
    async (date) => {
      const frames = await framesOf(date);
      let free = 0;
      for (const frame of frames) {
        expect(frame.utcStart.getTime()).toBeGreaterThanOrEqual(free);
        free = frame.utcStart.getTime() + frame.exposure * 1000;
        const geometry = frameGeometry({
          site,
          ra: frame.ra,
          dec: frame.decl,
          utcStart: frame.utcStart.getTime(),
          exposure_s: frame.exposure,
        });
        expectWithin(frame.sunAltitude, geometry.sunAltitude, { absolute: 1e-9, unit: 'deg' });
        expect(frame.utcMid.getTime()).toBe(geometry.utcMid);
        if (frame.type !== 'standard' && frame.type !== 'target') continue;
        expect(frame.sunAltitude).toBeLessThan(-18);
        expect(frame.altitude).toBeGreaterThan(25);
        expectWithin(frame.airmass ?? Number.NaN, geometry.airmass ?? 0, { absolute: 1e-9, unit: 'airmass' });
        expect(frame.field === null).toBe(frame.type === 'target');
        expect(frame.programmeId === null).toBe(frame.type === 'standard');
      }
    },
  );

  it('the good night has standards from airmass 1.2 to 2 in five bands, and frames of all three programmes', async () => {
    const frames = await framesOf('2026-11-03');
    for (const band of ['U', 'B', 'V', 'R', 'I']) {
      const airmasses = frames
        .filter((f) => f.type === 'standard' && f.band === band)
        .map((f) => f.airmass ?? 0);
      expect(Math.min(...airmasses)).toBeLessThan(1.2);
      expect(Math.max(...airmasses)).toBeGreaterThan(2);
    }
    const programmes = new Set(frames.flatMap(({ programmeId }) => programmeId ?? []));
    expect(programmes.size).toBe(await Programme.count());
  });

  it('loading it again changes nothing but passwords that differ', async () => {
    const frames = await Frame.count();
    const [somebody] = await Person.findAll({ where: { email: 'observer@evenfall.example' } });
    const before = somebody?.passwordHash;
    await seedDemo(database(), { password, now: now + 86_400_000 });
    expect(await Frame.count()).toBe(frames);
    expect(await Night.count()).toBe(4);
    await somebody?.reload();
    expect(somebody?.passwordHash).toBe(before);

    await seedDemo(database(), { password: 'another one', now });
    await somebody?.reload();
    expect(await passwordMatches(somebody?.passwordHash ?? null, 'another one')).toBe(true);
  });

  it('is refused by a database that belongs to a real observatory', async () => {
    await emptyTables();
    await Observatory.create({ name: 'A real one', isDemo: false, settings: {} });
    await expect(seedDemo(database(), { password, now })).rejects.toThrow('belongs to A real one');
    expect(await Person.count()).toBe(0);
  });
});
