import { readdir, readFile } from 'node:fs/promises';
import { describe, expect, it } from 'vitest';
import { makeStarFiles, makeUploadFiles } from '@/db/seeders/demo/make-files';
import { faults, repeatedRow } from '@/db/seeders/demo/sample-uploads';
import { readPublishedStars } from '@/db/seeders/demo/standard-fields';
import { separation } from '@/lib/astro/separation';
import { standardMatcher } from '@/lib/photometry/match-standards';
import { fixturePath } from '@/db/seeders/fixture-files';

const starFiles = await makeStarFiles();
const uploadFiles = await makeUploadFiles();
const stored = (name: string): Promise<string> => readFile(fixturePath(name), 'utf8');
const dataLines = (text: string): readonly string[] =>
  text
    .trimEnd()
    .split('\n')
    .filter((line) => !line.startsWith('#'))
    .slice(1);

describe('fixtures that are computed', () => {
  it.each([...starFiles, ...uploadFiles])('%s is what the script makes', async (name, content) => {
    expect((await stored(name)) === content).toBe(true);
  });

  it('there is no sample upload that the script does not make', async () => {
    const names = (await readdir(fixturePath('uploads'))).map((name) => `uploads/${name}`);
    expect(names.toSorted()).toEqual([...uploadFiles.keys()].toSorted());
  });

  it('standards stand where their proper motion has taken them, so that their positions alone tell their names', async () => {
    const published = await readPublishedStars();
    const column = (name: 'ra' | 'dec' | 'pmRa' | 'pmDec'): Float64Array =>
      Float64Array.from(published, (star) => star[name]);
    const table = {
      names: published.map(({ name }) => name),
      keys: published.map(() => ''),
      ...{ ra: column('ra'), dec: column('dec'), pmRa: column('pmRa'), pmDec: column('pmDec') },
      unusable: published.map(() => ''),
    };
    const match = standardMatcher(table, { tolerance: 0.1, epoch_years: 26.838 });
    const measured = new Map(
      dataLines(await stored('uploads/2026-11-03-standards.csv')).map((line) => {
        const [, star = '', ra, dec] = line.split(',');
        return [star, { ra: Number(ra), dec: Number(dec) }] as const;
      }),
    );
    for (const [star, place] of measured) {
      const found = match({ key: '', ...place });
      expect(found.kind === 'matched' ? table.names[found.standard] : found.reason).toBe(star);
    }
    const moved = published.filter((star) => {
      const place = measured.get(star.name);
      return place !== undefined && separation(star, place) * 3600 > 5;
    });
    expect(moved.map(({ name }) => name)).toContain('92 409');
  });

  it('the faulty table differs from the good lines in a dozen lines and more, each with a fault of its own kind', async () => {
    const lines = dataLines(await stored('uploads/2026-11-03-standards-faulty.csv'));
    expect(faults.length).toBeGreaterThanOrEqual(12);
    expect(new Set(faults.map(({ what }) => what)).size).toBe(faults.length);
    expect(lines[repeatedRow]).toBe(lines[repeatedRow - 1]);
    expect(lines).toHaveLength(61);
  });

  it('the mistaken star has the light of its neighbour on every frame, and no other line differs', async () => {
    const cells = async (name: string): Promise<readonly (readonly string[])[]> =>
      dataLines(await stored(name)).map((line) => line.split(','));
    const wrong = await cells('uploads/2026-11-03-standards-misidentified.csv');
    const right = await cells('uploads/2026-11-03-standards.csv');
    const magnitudes = (rows: readonly (readonly string[])[]): ReadonlyMap<string, number> =>
      new Map(
        rows.map((row) => [`${Number(row[0]?.replace(/^.*-|\.fits$/g, ''))} ${row[1]}`, Number(row[4])]),
      );
    const good = magnitudes(right);
    const changed = [...magnitudes(wrong)].filter(([key, mag]) => good.has(key) && good.get(key) !== mag);
    expect(new Set(changed.map(([key]) => key.replace(/^\d+ /, '')))).toEqual(new Set(['98 670']));
    expect(changed.length).toBeGreaterThan(5);
  });
});
