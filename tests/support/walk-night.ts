import { measure } from '@/db/seeders/demo/make-files';
import { observeNight, readDemoSky } from '@/db/seeders/demo/demo-nights';
import { readDemoWorld } from '@/db/seeders/demo/demo-world';
import { nightTables } from '@/db/seeders/demo/sample-uploads';
import type { FrameInput } from '@/lib/contracts/api/frame';

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

/** How far results are from the truth in their own errors. */
export interface Pulls {
  readonly n: number;
  readonly mean: number;
  readonly deviation: number;
}

export function pulls(
  differences: readonly { readonly difference: number; readonly error: number }[],
): Pulls {
  const values = differences.map(({ difference, error }) => difference / error);
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1);
  return { n: values.length, mean, deviation: Math.sqrt(variance) };
}
