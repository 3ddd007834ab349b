import { readDemoWorld, type DemoTarget, type DemoWorld } from './demo-world';
import { observeNight, readDemoSky, starFiles, type DemoSky, type ObservedNight } from './demo-nights';
import {
  inventGorse,
  inventMarrow,
  inventThistle,
  readMainSequence,
  type InventedStar,
} from './invent-stars';
import { faultyTable, foreignTable, mistakenTable, nightTables, type Files } from './sample-uploads';
import { halfWidthOf, measureNight, type Measurement } from './simulate-night';

const starColumns = ['name', 'ra', 'dec', 'V', 'BV', 'UB', 'VR', 'VI', 'kind'] as const;

function starTable(stars: readonly InventedStar[]): string {
  const lines = stars.map((star) => starColumns.map((name) => String(star[name])).join(','));
  return `${[starColumns.join(','), ...lines].join('\n')}\n`;
}

function targetIn({ observatory }: DemoWorld, name: string): DemoTarget {
  const target = observatory.programmes
    .flatMap(({ targets }) => targets)
    .find((candidate) => candidate.name === name);
  if (target === undefined) throw new Error(`No programme of the demo observes ${name}.`);
  return target;
}

/** The tables of invented stars, by their paths below fixtures. */
export async function makeStarFiles(): Promise<Files> {
  const world = await readDemoWorld();
  const sequence = await readMainSequence();
  const halfWidth = halfWidthOf(world.observatory.camera);
  const inventors = {
    'Thistle 3': inventThistle,
    'LV Marrow': inventMarrow,
    'Gorse 2': inventGorse,
  } as const;
  return new Map(
    (Object.keys(starFiles) as (keyof typeof starFiles)[]).map((name) => [
      starFiles[name],
      starTable(inventors[name](targetIn(world, name), halfWidth, sequence)),
    ]),
  );
}

/** What the stars of a night's frames measured. */
export function measure(
  observed: ObservedNight,
  sky: DemoSky,
  mistaken?: ReadonlyMap<string, string>,
): readonly Measurement[] {
  const { site, camera } = sky.observatory;
  return measureNight({ ...observed, site, camera, starsOf: sky.starsOf, ...(mistaken && { mistaken }) });
}

/** In the sample with a mistake the lines of the first star hold the light of the second. */
const mistaken = new Map([['98 670', '98 671']]);

/** The sample uploads of the nights with fixed dates, by their paths below fixtures. */
export async function makeUploadFiles(): Promise<Files> {
  const world = await readDemoWorld();
  const sky = await readDemoSky(world, true);
  const files = new Map<string, string>();
  const keep = (made: Files): void => made.forEach((content, name) => files.set(`uploads/${name}`, content));
  for (const plan of world.nights.nights) {
    const observed = observeNight(plan, sky);
    const measurements = measure(observed, sky, new Map(Object.entries(plan.mistaken ?? {})));
    keep(nightTables(plan.date, measurements));
    if (plan.samples !== true) continue;
    keep(foreignTable(plan.date, measurements));
    keep(faultyTable(plan.date, measurements));
    keep(mistakenTable(plan.date, measure(observed, sky, mistaken)));
  }
  return files;
}
