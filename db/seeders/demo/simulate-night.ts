import { airmassYoung1994 } from '@/lib/astro/airmass';
import { horizontalPlace } from '@/lib/astro/horizontal-place';
import { placeAfter, yearsSinceJ2000 } from '@/lib/astro/proper-motion';
import { skyMoment } from '@/lib/astro/sky-moment';
import { bandPlaces, simulate, type Disturbances, type Simulation } from '@/lib/photometry/simulate';
import type { StarColours } from '@/lib/photometry/bands';
import type { DemoCamera, DemoSite, DemoTruth, DemoWeather } from './demo-world';
import { marrowVariation } from './invent-stars';
import { minute_ms, type NightTimes } from './night-time';
import type { DemoFrame } from './plan-frames';
import { isOnCamera, offsetFrom } from './standard-fields';
import { cloudEpisodes } from './weather';

/** A star that can be on a frame: published, with the error of its magnitudes, or invented, without. */
export interface DemoStar extends Readonly<Record<keyof StarColours, number>> {
  readonly name: string;
  /** J2000, at the epoch 2000.0 [deg]. */
  readonly ra: number;
  readonly dec: number;
  /** Times cos dec [mas/yr]; NaN where it is not known. */
  readonly pmRa: number;
  readonly pmDec: number;
  readonly error: number;
}

/** One line of a table of measurements. */
export interface Measurement {
  readonly frame: DemoFrame;
  readonly star: string;
  readonly ra: number;
  readonly dec: number;
  readonly instMag: number;
  readonly instErr: number;
  readonly x: number;
  readonly y: number;
  readonly fwhm_px: number;
  readonly sky: number;
  readonly peak: number;
}

export interface NightOnSky {
  readonly night: NightTimes;
  readonly frames: readonly DemoFrame[];
  readonly weather: DemoWeather;
  readonly truth: DemoTruth;
  readonly seed: number;
  readonly site: DemoSite;
  readonly camera: DemoCamera;
  /** All stars that a frame of this object may hold. */
  readonly starsOf: (frame: DemoFrame) => readonly DemoStar[];
  /** Names of standards in whose place another star was measured: the other star's name. */
  readonly mistaken?: ReadonlyMap<string, string>;
}

const faintestSignal = 5;
const magnitudeConstant = 25;
/** Stars nearer to the edge are not measured [deg]. */
const edge = 0.005;
const hour_ms = 60 * minute_ms;
const noise_mag = 1.0857;

/** Half the camera's width on the sky within which stars are measured [deg]. */
export const halfWidthOf = (camera: DemoCamera): number =>
  (camera.width_px * camera.pixel_scale) / 7200 - edge;

/** Measures all stars on the night's standard and target frames, as a reduction program would: saturated and lost stars are left out. */
export function measureNight(input: NightOnSky): readonly Measurement[] {
  const { truth, camera } = input;
  const frames = input.frames.filter(
    ({ type, band }) =>
      (type === 'standard' || type === 'target') && band !== null && truth[band] !== undefined,
  );
  const { pairs, stars } = pairUp(input, frames);
  const simulation = runSimulation(input, frames, { pairs, stars });
  const bad = (o: number): boolean =>
    (simulation.instErr[o] ?? 1) > noise_mag / faintestSignal ||
    (simulation.peak_counts[o] ?? 0) >= camera.saturation;
  return pairs.flatMap((pair, o) => (bad(o) ? [] : [toMeasurement(pair, simulation, o, camera)]));
}

interface Pair {
  readonly frame: DemoFrame;
  readonly frameIndex: number;
  readonly star: DemoStar;
  readonly starIndex: number;
}

function pairUp(
  input: NightOnSky,
  frames: readonly DemoFrame[],
): { readonly pairs: readonly Pair[]; readonly stars: readonly DemoStar[] } {
  const places = new Map<string, number>();
  const stars: DemoStar[] = [];
  const placeOf = (star: DemoStar): number => {
    const known = places.get(star.name);
    if (known !== undefined) return known;
    places.set(star.name, stars.length);
    return stars.push(star) - 1;
  };
  const halfWidth = halfWidthOf(input.camera);
  // A frame shows a star where it stands by now.
  const years = yearsSinceJ2000((input.night.bounds.start + input.night.bounds.end) / 2);
  const tonight = (star: DemoStar): DemoStar => ({ ...star, ...placeAfter(star, star, years) });
  const pairs = frames.flatMap((frame, frameIndex) =>
    input
      .starsOf(frame)
      .map(tonight)
      .filter((star) => isOnCamera(aimOf(frame), star, halfWidth))
      .map((star) => ({ frame, frameIndex, star, starIndex: placeOf(star) })),
  );
  return { pairs, stars };
}

function aimOf({ ra, dec, number }: DemoFrame): { readonly ra: number; readonly dec: number } {
  if (ra === null || dec === null) throw new Error(`Frame ${number} has stars but no position.`);
  return { ra, dec };
}

function runSimulation(
  input: NightOnSky,
  frames: readonly DemoFrame[],
  { pairs, stars }: { readonly pairs: readonly Pair[]; readonly stars: readonly DemoStar[] },
): Simulation {
  const { site, camera, seed, night, weather, truth } = input;
  const standards = frames.filter(({ type }) => type === 'standard');
  const zero = standards.reduce((sum, { utcMid }) => sum + utcMid / standards.length, 0);
  const column = (value: (frame: DemoFrame) => number): Float64Array => Float64Array.from(frames, value);
  const moments = frames.map(({ utcMid }) => skyMoment(site, utcMid));
  const airmass = ({ frameIndex, star }: Pair): number => {
    const moment = moments[frameIndex];
    if (moment === undefined) throw new Error(`There is no frame ${frameIndex}.`);
    return airmassYoung1994(horizontalPlace(moment, star.ra, star.dec).zenithDistance);
  };
  return simulate({
    seed,
    bands: truth,
    frames: {
      band: bandPlaces(frames.flatMap(({ band }) => band ?? [])),
      hours: column(({ utcMid }) => (utcMid - zero) / hour_ms),
      exposure_s: column(({ exposure_s }) => exposure_s),
      fwhm_arcsec: column(({ fwhm }) => fwhm ?? weather.seeing),
      sky: column(({ sky }) => sky ?? weather.sky_brightness),
    },
    stars: columnsOf(stars, (star, name) => star[name]),
    starErrors: columnsOf(stars, ({ error }) => error),
    observations: {
      frame: Uint32Array.from(pairs, ({ frameIndex }) => frameIndex),
      star: Uint32Array.from(pairs, ({ starIndex }) => starIndex),
      airmass: Float64Array.from(pairs, airmass),
      variation: Float64Array.from(pairs, ({ star, frame }) =>
        star.name === 'LV Marrow' ? marrowVariation(frame.utcMid, frame.band ?? 'V') : 0,
      ),
    },
    camera: {
      pixelScale_arcsec: camera.pixel_scale,
      gain: camera.gain,
      readNoise: camera.read_noise,
      darkCurrent: 0.003,
      magnitudeConstant,
    },
    disturbances: {
      clouds: cloudEpisodes(night, weather, zero),
      misidentified: mistakesIn(stars, input.mistaken),
    },
  });
}

const columnsOf = (
  stars: readonly DemoStar[],
  value: (star: DemoStar, name: keyof StarColours) => number,
): StarColours => ({
  V: Float64Array.from(stars, (star) => value(star, 'V')),
  BV: Float64Array.from(stars, (star) => value(star, 'BV')),
  UB: Float64Array.from(stars, (star) => value(star, 'UB')),
  VR: Float64Array.from(stars, (star) => value(star, 'VR')),
  VI: Float64Array.from(stars, (star) => value(star, 'VI')),
});

function mistakesIn(
  stars: readonly DemoStar[],
  mistaken: NightOnSky['mistaken'],
): NonNullable<Disturbances['misidentified']> {
  return stars.flatMap((star, place) => {
    const measured = stars.find(({ name }) => name === mistaken?.get(star.name));
    return measured === undefined ? [] : [{ star: place, measured }];
  });
}

function toMeasurement(
  { frame, star }: Pair,
  simulation: Simulation,
  o: number,
  camera: DemoCamera,
): Measurement {
  const { east, north } = offsetFrom(aimOf(frame), star);
  const value = (column: Float64Array): number => column[o] ?? Number.NaN;
  return {
    frame,
    star: star.name,
    ra: star.ra,
    dec: star.dec,
    instMag: value(simulation.instMag),
    instErr: value(simulation.instErr),
    x: camera.width_px / 2 - (east * 3600) / camera.pixel_scale,
    y: camera.height_px / 2 + (north * 3600) / camera.pixel_scale,
    fwhm_px: (frame.fwhm ?? 0) / camera.pixel_scale,
    sky: value(simulation.sky_counts),
    peak: value(simulation.peak_counts),
  };
}
