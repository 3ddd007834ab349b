import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { demoToken } from '../support/api';
import { pulls, walkNight, type WalkNight } from '../support/walk-night';

const run = promisify(execFile);
const script = path.resolve('public/examples/whole-night.sh');

let folder: string;
let night: WalkNight;

beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'evenfall-walk-'));
  night = await walkNight('2026-10-15', 20261015);
  await writeFile(path.join(folder, 'frames.json'), JSON.stringify(night.frames));
  await writeFile(path.join(folder, 'standards.csv'), night.standards);
  await writeFile(path.join(folder, 'targets.csv'), night.targets);
});
afterAll(() => rm(folder, { recursive: true, force: true }));

describe('the example script of the interface', () => {
  it('takes a night from its frames to calibrated magnitudes that agree with the truth of the simulation', async () => {
    const { stdout } = await run(script, [folder], {
      env: {
        ...process.env,
        EVENFALL_URL: inject('baseUrl'),
        TELESCOPE: 'larkspur',
        NIGHT_DATE: night.date,
        OBSERVER: await demoToken('observer'),
        PHOTOMETRIST: await demoToken('photometrist'),
        APPROVER: await demoToken('photometrist2'),
        INVESTIGATOR: await demoToken('pi'),
      },
    });
    expect(stdout).toContain('The fit is determined and suggests: photometric.');

    const rows = readRows(await readFile(path.join(folder, 'calibrated.csv'), 'utf8'));
    const known = rows.flatMap((row) => {
      const truth = night.truth.get(row['star'] ?? '');
      return truth === undefined || row['flags'] !== '' ? [] : [{ row, truth }];
    });
    expect(known.length).toBeGreaterThan(300);
    for (const quantity of ['V', 'BV'] as const) {
      const differences = known.map(({ row, truth }) => ({
        difference: Number(row[quantity]) - truth[quantity],
        random: Number(row[`${quantity}_random`]),
        systematic: Number(row[`${quantity}_systematic`]),
        total: Number(row[`${quantity}_total`]),
      }));
      for (const { random, systematic, total } of differences) {
        expect(Math.abs(Math.hypot(random, systematic) - total)).toBeLessThan(2e-5);
      }
      // Coefficients and frame offsets are common to all stars of a field: they move the mean, and by no more than the
      // errors say; about it the stars scatter as their random errors say, which hold the frames' share too.
      const bright = differences.toSorted((a, b) => a.total - b.total).slice(0, 50);
      const meanOf = (values: readonly number[]): number =>
        values.reduce((sum, value) => sum + value / values.length, 0);
      const common = meanOf(bright.map(({ difference }) => difference));
      expect(Math.abs(common)).toBeLessThan(3 * meanOf(bright.map(({ total }) => total)));
      const own = pulls(
        differences.map(({ difference, random }) => ({ difference: difference - common, error: random })),
      );
      expect(own.deviation).toBeGreaterThan(0.7);
      expect(own.deviation).toBeLessThan(1.15);
    }
  });
});

function readRows(text: string): readonly Readonly<Record<string, string>>[] {
  const [head = '', ...lines] = text
    .trimEnd()
    .split('\n')
    .filter((line) => !line.startsWith('#'));
  const names = head.trim().split(',');
  return lines.map((line) => {
    const cells = line.trim().split(',');
    return Object.fromEntries(names.map((name, place) => [name, cells[place] ?? '']));
  });
}
