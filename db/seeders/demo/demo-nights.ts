import { readTable } from '../fixture-files';
import type { DemoNight, DemoTruth, DemoWeather, DemoWorld } from './demo-world';
import type { InventedStar } from './invent-stars';
import { clockTime, nightTimes, type NightTimes } from './night-time';
import { planFrames, type DemoFrame, type Observables } from './plan-frames';
import { planTonight, tonightAt } from './plan-tonight';
import { halfWidthOf, type DemoStar, type NightOnSky } from './simulate-night';
import { bestPointings, readPublishedStars } from './standard-fields';

/** One night of the demo as it was observed. */
export interface ObservedNight {
  readonly night: NightTimes;
  readonly frames: readonly DemoFrame[];
  readonly weather: DemoWeather;
  readonly truth: DemoTruth;
  readonly seed: number;
  /** How far its log goes [ms since 1970]. */
  readonly until: number;
}

/** What is on the sky, and what it is observed with. */
export interface DemoSky extends Observables {
  readonly starsOf: NightOnSky['starsOf'];
}

/** Fixture files of invented stars, by the object they belong to. */
export const starFiles = {
  'Thistle 3': 'demo/stars-thistle-3.csv',
  'LV Marrow': 'demo/stars-lv-marrow.csv',
  'Gorse 2': 'demo/stars-gorse-2.csv',
} as const;

/** The demo's sky with the published standards; with the invented stars only when `withTargets`. */
export async function readDemoSky(
  { observatory, nights }: DemoWorld,
  withTargets: boolean,
): Promise<DemoSky> {
  const published = await readPublishedStars();
  const invented = new Map<string, readonly DemoStar[]>();
  for (const [object, file] of withTargets ? Object.entries(starFiles) : []) {
    const lines = await readTable<keyof InventedStar>(file);
    const number = (line: (typeof lines)[number], column: keyof InventedStar): number => Number(line[column]);
    invented.set(
      object,
      lines.map((line) => ({
        name: line.name,
        ra: number(line, 'ra'),
        dec: number(line, 'dec'),
        // Invented where they stand tonight.
        pmRa: 0,
        pmDec: 0,
        V: number(line, 'V'),
        BV: number(line, 'BV'),
        UB: number(line, 'UB'),
        VR: number(line, 'VR'),
        VI: number(line, 'VI'),
        error: 0,
      })),
    );
  }
  return {
    observatory,
    exposures: nights.exposures,
    pointings: bestPointings(published, halfWidthOf(observatory.camera)),
    starsOf: ({ type, object }) => (type === 'standard' ? published : (invented.get(object) ?? [])),
  };
}

/** A night of the fixtures, whole. */
export function observeNight(plan: DemoNight, sky: Observables): ObservedNight {
  const night = nightTimes(sky.observatory.site, plan.date);
  const { weather, truth, seed, visits } = plan;
  const until = clockTime(night, plan.closed_at);
  return {
    night,
    weather,
    truth,
    seed,
    until,
    frames: planFrames({ night, visits, weather, seed, until }, sky),
  };
}

/** The night in progress at `now` [ms since 1970], as far as it has got. */
export function observeTonight(world: DemoWorld, sky: Observables, now: number): ObservedNight {
  const { weather, truth, seed } = world.nights.tonight;
  const tonight = tonightAt(now, sky);
  const visits = planTonight(tonight, sky);
  const { night, until } = tonight;
  return {
    night,
    weather,
    truth,
    seed,
    until,
    frames: planFrames({ night, visits, weather, seed, until }, sky),
  };
}

/**
 * A log with a hole: the frames of the last standard field but one were taken but never written down, as happens when
 * the link to the dome drops. An upload that tells when they were taken fills the hole. No hole in a short log.
 */
export function withHole(frames: readonly DemoFrame[]): {
  readonly logged: readonly DemoFrame[];
  readonly missing: readonly DemoFrame[];
} {
  const standards = frames.filter(({ type }) => type === 'standard');
  const visits = standards.filter(({ object }, index) => object !== standards[index - 1]?.object);
  const hole = visits.at(-2);
  const next = visits.at(-1);
  if (visits.length < 3 || hole === undefined || next === undefined) return { logged: frames, missing: [] };
  const isMissing = ({ type, number }: DemoFrame): boolean =>
    type === 'standard' && number >= hole.number && number < next.number;
  return { logged: frames.filter((frame) => !isMissing(frame)), missing: frames.filter(isMissing) };
}
