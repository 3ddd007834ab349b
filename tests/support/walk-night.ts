import { expect } from 'vitest';
import { measure } from '@/db/seeders/demo/make-files';
import { observeNight, readDemoSky } from '@/db/seeders/demo/demo-nights';
import { readDemoWorld } from '@/db/seeders/demo/demo-world';
import { nightTables } from '@/db/seeders/demo/sample-uploads';
import type { FrameInput } from '@/lib/contracts/api/frame';
import { expectWithin } from './numbers';

/** What a walk through the whole job brings along: an observer's log, the tables made from its frames, and the truth. */
export interface WalkNight {
  readonly date: string;
  readonly frames: readonly FrameInput[];
  readonly standards: string;
  readonly targets: string;
  /** True magnitude and colour of the invented stars that do not vary, by name. */
  readonly truth: ReadonlyMap<string, { readonly V: number; readonly BV: number }>;
}

const targets = ['Thistle 3', 'Gorse 2'] as const;

/** A good night of the demo's observatory on a date of its own, simulated with a seed of its own. */
export async function walkNight(date: string, seed: number): Promise<WalkNight> {
  const world = await readDemoWorld();
  const sky = await readDemoSky(world, true);
  const [plan] = world.nights.nights;
  if (plan === undefined) throw new Error('The demo has no night.');
  const observed = observeNight({ ...plan, date, seed }, sky);
  const tables = nightTables(date, measure(observed, sky));
  const table = (name: string): string => {
    const content = tables.get(name);
    if (content === undefined) throw new Error(`There is no table ${name}.`);
    return content;
  };
  const truth = new Map<string, { readonly V: number; readonly BV: number }>();
  for (const object of targets) {
    const frame = observed.frames.find((candidate) => candidate.object === object);
    if (frame === undefined) throw new Error(`The night has no frame of ${object}.`);
    for (const { name, V, BV } of sky.starsOf(frame)) truth.set(name, { V, BV });
  }
  return {
    date,
    frames: observed.frames.map((frame) => ({
      number: frame.number,
      type: frame.type,
      file: frame.file,
      object: frame.object,
      field: frame.field,
      programme: frame.programme,
      ra: frame.ra,
      dec: frame.dec,
      band: frame.band,
      utc_start: new Date(frame.utcStart).toISOString(),
      exposure: frame.exposure_s,
      fwhm: frame.fwhm,
      sky: frame.sky,
      comment: frame.comment,
    })),
    standards: table(`${date}-standards.csv`),
    targets: table(`${date}-targets.csv`),
    truth,
  };
}

type Row = Readonly<Record<string, string>>;

/** Rows of a downloaded table by their headers; its first lines, with #, are the provenance. */
export function readCalibrated(text: string): readonly Row[] {
  const [head = '', ...lines] = text
    .trimEnd()
    .split(/\r?\n/)
    .filter((line) => !line.startsWith('#'));
  const names = head.split(',');
  return lines.map((line) => {
    const cells = line.split(',');
    return Object.fromEntries(names.map((name, place) => [name, cells[place] ?? '']));
  });
}

const mean = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length;

/**
 * Holds downloaded magnitudes to the truth. Coefficients and frame offsets are common to all stars of a field: they move
 * the mean, by no more than the errors say. About it the stars scatter by no more than their random errors, which hold
 * the frames' share too.
 */
export function expectTruth(rows: readonly Row[], { truth }: WalkNight): void {
  const known = rows.flatMap((row) => {
    const star = truth.get(row['star'] ?? '');
    return star === undefined || row['flags'] !== '' ? [] : [{ row, star }];
  });
  expect(known.length).toBeGreaterThan(300);
  for (const quantity of ['V', 'BV'] as const) {
    const stars = known.map(({ row, star }) => ({
      difference: Number(row[quantity]) - star[quantity],
      random: Number(row[`${quantity}_random`]),
      systematic: Number(row[`${quantity}_systematic`]),
      total: Number(row[`${quantity}_total`]),
    }));
    for (const { random, systematic, total } of stars) {
      expectWithin(total, Math.hypot(random, systematic), { absolute: 2e-4, unit: 'mag' });
    }
    const bright = stars.toSorted((a, b) => a.total - b.total).slice(0, 50);
    const common = mean(bright.map(({ difference }) => difference));
    expect(Math.abs(common)).toBeLessThan(3 * mean(bright.map(({ total }) => total)));
    const pulls = stars.map(({ difference, random }) => (difference - common) / random);
    const deviation = Math.sqrt(mean(pulls.map((pull) => pull ** 2)));
    expect(deviation).toBeGreaterThan(0.7);
    expect(deviation).toBeLessThan(1.15);
  }
}
