import { beforeAll, describe, expect, it } from 'vitest';
import { database } from '@/db/connection';
import { StandardSource } from '@/db/models/standard-source';
import { StandardStar } from '@/db/models/standard-star';
import { seedReference } from '@/db/seeders/reference';
import { StandardQuery } from '@/lib/contracts/api/standard';
import { starKey } from '@/lib/contracts/star-name';
import { listStandards } from '@/lib/server/reads/list-standards';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { newCaller } from '@/tests/support/log-world';
import { expectWithin } from '@/tests/support/numbers';

let caller: PersonCaller;

const list = (query: Record<string, string>) => listStandards(caller, StandardQuery.parse(query));
const names = async (query: Record<string, string>): Promise<readonly string[]> =>
  (await list({ limit: '1000', ...query })).items.map(({ name }) => name);

/** Distance by the angle between unit vectors: another way than the one that is tested [deg]. */
function distance(a: { ra: number; dec: number }, b: { ra: number; dec: number }): number {
  const rad = Math.PI / 180;
  const unit = ({ ra, dec }: { ra: number; dec: number }): readonly number[] => [
    Math.cos(dec * rad) * Math.cos(ra * rad),
    Math.cos(dec * rad) * Math.sin(ra * rad),
    Math.sin(dec * rad),
  ];
  const [u, v] = [unit(a), unit(b)];
  const chord = Math.hypot(...u.map((value, axis) => value - (v[axis] ?? 0)));
  return (2 * Math.asin(Math.min(1, chord / 2))) / rad;
}

async function addStar(name: string, ra: number, decl: number): Promise<void> {
  const { id: sourceId } = await StandardSource.findOne({ rejectOnEmpty: true });
  await StandardStar.create({
    sourceId,
    name,
    nameKey: starKey(name),
    field: 'Invented',
    ra,
    decl,
    v: 12,
    bv: 0.5,
  });
}

describe('standard stars', () => {
  beforeAll(async () => {
    await seedReference(database());
    caller = await newCaller('Wren Achterberg');
    await addStar('East of 0', 0.02, 1);
    await addStar('West of 0', 359.98, 1);
    await addStar('Pole A', 10, 89.9);
    await addStar('Pole B', 190, 89.9);
    await addStar('South pole', 77, -89.95);
    await addStar('Per%cent_', 100, 60);
  });

  it('a search across right ascension 0 finds stars on both sides, nearest first', async () => {
    const { items } = await list({ ra: '359.99', dec: '1', radius: '0.05' });
    expect(items.map(({ name }) => name)).toEqual(['West of 0', 'East of 0']);
    expectWithin(items[0]?.separation ?? Number.NaN, 0.01 * Math.cos(Math.PI / 180), {
      absolute: 1e-9,
      unit: 'deg',
    });
  });

  it('a search around the pole finds stars on its far side', async () => {
    expect(await names({ ra: '10', dec: '89.95', radius: '0.2' })).toEqual(['Pole A', 'Pole B']);
    expect(await names({ ra: '250', dec: '-90', radius: '0.06' })).toEqual(['South pole']);
  });

  it.each([
    ['15.2', '0.7', '3'],
    ['0', '0', '12'],
    ['283', '-20', '45'],
    ['120', '88', '179.5'],
  ])(
    'around %s, %s within %s degrees it finds what a search through all stars finds',
    async (ra, dec, radius) => {
      const centre = { ra: Number(ra), dec: Number(dec) };
      const all = (await list({ limit: '1000' })).items;
      const expected = all.filter((star) => distance(centre, star) <= Number(radius)).map(({ name }) => name);
      const found = await list({ ra, dec, radius, limit: '1000' });
      expect(found.items.map(({ name }) => name).toSorted()).toEqual(expected.toSorted());
      const separations = found.items.map(({ separation }) => separation ?? Number.NaN);
      expect(separations).toEqual(separations.toSorted((a, b) => a - b));
    },
  );

  it('pages follow each other without a gap or a repetition, in both orders', async () => {
    for (const query of [{}, { ra: '100', dec: '0', radius: '90' }]) {
      const whole = await names(query);
      const seen: string[] = [];
      let after: string | null = null;
      do {
        const page: Awaited<ReturnType<typeof list>> = await list({
          ...query,
          limit: '97',
          ...(after && { after }),
        });
        seen.push(...page.items.map(({ name }) => name));
        after = page.next;
      } while (after !== null);
      expect(seen).toEqual(whole);
      expect(new Set(seen).size).toBe(seen.length);
    }
  });

  it('a field and a star are found in any spelling', async () => {
    expect(await names({ field: 't-phe' })).toHaveLength(11);
    expect(await names({ field: 'g163 50/51' })).toHaveLength(7);
    expect(await names({ field: 'no such field' })).toEqual([]);
    expect(await names({ name: '92-2 59' })).toEqual(['92 259']);
  });

  it('signs of a pattern in a name mean themselves', async () => {
    expect(await names({ name: '%' })).toEqual(['Per%cent_']);
    expect(await names({ name: '_' })).toEqual(['Per%cent_']);
  });

  it('a star says whether it may be used, from where it is and which error holds', async () => {
    const [star] = (await list({ name: 'G163 51E' })).items;
    expect(star).toMatchObject({ usable: false, e_V: null, default_error: 0.003, separation: null });
    expect(star?.caution).toContain('another star');
    expect(star?.source).toContain('Landolt 2009');
  });

  it('V−I is the published one, or the sum of V−R and R−I', async () => {
    expect((await list({ name: 'TPhe C' })).items[0]?.VI).toBe(-0.36);
    expect((await list({ name: '95 112' })).items[0]).toMatchObject({ VR: 0.605, RI: 0.62, VI: 1.225 });
  });

  it.each([
    [{ ra: '10' }, ['dec', 'radius']],
    [{ ra: '10', dec: '', radius: '1' }, ['dec']],
    [{ ra: '360', dec: '0', radius: '1' }, ['ra']],
    [{ ra: '1', dec: '-90.5', radius: '1' }, ['dec']],
    [{ ra: '1', dec: '0', radius: '0' }, ['radius']],
    [{ ra: '1', dec: '0', radius: '1e3' }, ['radius']],
  ])('a search with %j is refused, and each name is told', (query, wrong) => {
    const { error } = StandardQuery.safeParse(query);
    expect(error?.issues.map(({ path }) => path.join('.'))).toEqual(wrong);
  });
});
