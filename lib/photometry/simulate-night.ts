/**
 * A night as an observatory would plan it, simulated: standard fields visited in turn between two airmasses, and target
 * stars measured in between, in the shape that the fit and the transformation take, with the truth beside them.
 *
 * Airmasses of the visits are spread evenly over their range and shuffled, so that they do not follow the time; colours
 * are spread evenly over each field. Times count from the mean time of the observations of standards, as in the fit.
 * Disturbances fall on the standards only: a transformation has no way to know a spoilt target from a good one.
 */
import { createRandom, type Random } from '@/lib/numerics/random';
import { bandOrder, bandPlace, nBands, type BandName, type StarColours } from './bands';
import type { Range } from './night-solution';
import {
  equalErrors,
  simulate,
  type Disturbances,
  type SimulatedBand,
  type SimulatedCamera,
  type Simulation,
  type SimulationInput,
} from './simulate';
import type { StandardObservations } from './standard-observations';
import type { TargetMeasurements } from './target-measurements';

export interface NightRecipe {
  /** An integer of 32 bits. */
  readonly seed: number;
  /** Seed of the standard stars, for nights that share them; that of the night when absent. */
  readonly starSeed?: number;
  /** Truth; hours count from the mean time of the standards. One frame of each band at every visit. */
  readonly bands: Readonly<Partial<Record<BandName, SimulatedBand>>>;
  readonly nFields: number;
  readonly starsPerField: number;
  /** Visits to standard fields in the night. */
  readonly nVisits: number;
  readonly airmass: Range;
  readonly length_hours: number;
  /** Standard error of every published magnitude and colour [mag]. */
  readonly starError: number;
  readonly nTargets: number;
  /** Frames of the targets in each band. */
  readonly nTargetFrames: number;
  /** By number of the visit: frames in all its bands are dimmed by so much [mag]. */
  readonly cloudyVisit?: { readonly visit: number; readonly depth: number };
  /** What else goes wrong on the standards. */
  readonly disturbances?: Omit<Disturbances, 'clouds'>;
}

export interface SimulatedNight {
  readonly standards: StandardObservations;
  readonly targets: TargetMeasurements;
  readonly truth: {
    readonly bands: NightRecipe['bands'];
    /** Of the targets, shape (n stars) each. */
    readonly targets: StarColours;
    /** Of the standards' observations. */
    readonly standards: Simulation['truth'];
  };
}

/** Parts of the seed: plan of the standards, plan of the targets, standard stars. The measurements have seeds of their own. */
const streams = { standards: 10, targets: 11, stars: 12 } as const;
/** Chance that a star of the field is not measured on a frame. */
const missed = 0.08;
const hoursPerDay = 24;
const secondsBetweenFrames_hours = 90 / 3600;
/** Any night will do. [d] */
const bjdOfMeanTime = 2_461_000.5;
/** Peak above which a measurement is marked [counts]. */
const saturation_counts = 60_000;

const camera: SimulatedCamera = {
  pixelScale_arcsec: 0.5,
  gain: 1.5,
  readNoise: 6,
  darkCurrent: 0.01,
  magnitudeConstant: 25,
};

/** Simulates a night.
 * @param recipe - truth, extent of the night, what goes wrong [mag, h, airmass]
 * @returns standards and targets as the fit and the transformation take them, and the truth [mag]
 * @throws {RangeError} when the recipe has no band, field, star or visit, or a count is not a whole number
 * @accuracy exact for the model of simulate.ts; colours beside B−V follow it on a straight line with scatter
 * @source design of this program */
export function simulateNight(recipe: NightRecipe): SimulatedNight {
  requireCounts(recipe);
  const bands = bandOrder.filter((band) => recipe.bands[band] !== undefined);
  const standards = planStandards(recipe, bands);
  const targets = planTargets(recipe, bands);
  const measured = simulate(standards);
  // A seed of its own: with the same one, frames of standards and targets would share their offsets.
  const measuredTargets = simulate({ ...targets.plan, seed: (recipe.seed ^ 0x5bd1e995) >>> 0 });
  return {
    standards: standardColumns(standards, measured),
    targets: targetColumns(targets, measuredTargets),
    truth: { bands: recipe.bands, targets: targets.plan.stars, standards: measured.truth },
  };
}

/** Frames of visits, one in each band, and every star of the field visited on each but for the missed ones. */
interface Visits {
  readonly band: number[];
  readonly hours: number[];
  readonly frame: number[];
  readonly star: number[];
  readonly airmass: number[];
  readonly frameAirmass: number[];
}

const emptyVisits = (): Visits => ({
  band: [],
  hours: [],
  frame: [],
  star: [],
  airmass: [],
  frameAirmass: [],
});

interface Visit {
  readonly hours: number;
  readonly airmass: number;
  readonly stars: readonly number[];
}

function addVisit(visits: Visits, bands: readonly BandName[], random: Random, visit: Visit): void {
  for (const [place, band] of bands.entries()) {
    const frame = visits.band.length;
    visits.band.push(bandPlace[band]);
    visits.hours.push(visit.hours + place * secondsBetweenFrames_hours);
    visits.frameAirmass.push(visit.airmass);
    for (const star of visit.stars) {
      // Across a field of half a degree the airmass differs by about this much.
      const airmass = visit.airmass + 0.006 * visit.airmass ** 2 * (random.uniform() - 0.5);
      if (random.uniform() < missed) continue;
      visits.frame.push(frame);
      visits.star.push(star);
      visits.airmass.push(airmass);
    }
  }
}

function planStandards(recipe: NightRecipe, bands: readonly BandName[]): SimulationInput {
  const { nFields, starsPerField, nVisits, length_hours, airmass } = recipe;
  const random = createRandom(recipe.seed, streams.standards);
  const visits = emptyVisits();
  const places = shuffled(nVisits, random);
  for (let v = 0; v < nVisits; v += 1) {
    const field = v % nFields;
    addVisit(visits, bands, random, {
      hours: (length_hours * (v + 0.5)) / nVisits,
      airmass: airmass.min + ((airmass.max - airmass.min) * (places[v]! + 0.5)) / nVisits,
      stars: Array.from({ length: starsPerField }, (_, k) => field * starsPerField + k),
    });
  }
  const mean = visits.frame.reduce((sum, f) => sum + visits.hours[f]!, 0) / visits.frame.length;
  const starRandom = createRandom(recipe.starSeed ?? recipe.seed, streams.stars);
  const stars = drawStars(starRandom, nFields * starsPerField, {
    V: { min: 10.4, max: 13.2 },
    BV: { min: -0.2, max: 1.6 },
    perGroup: starsPerField,
  });
  const hours = Float64Array.from(visits.hours, (value) => value - mean);
  const { cloudyVisit, disturbances } = recipe;
  const clouds = cloudyVisit === undefined ? [] : [cloudOver(hours, cloudyVisit, bands.length)];
  return {
    ...simulationInput(recipe, visits, hours),
    stars,
    starErrors: equalErrors(stars.V.length, recipe.starError),
    disturbances: { ...disturbances, clouds },
  };
}

interface TargetPlan {
  readonly plan: SimulationInput;
  /** Of the middle of each frame, shape (n frames). */
  readonly frameAirmass: Float64Array;
}

function planTargets(recipe: NightRecipe, bands: readonly BandName[]): TargetPlan {
  const { nTargets, nTargetFrames, length_hours, airmass } = recipe;
  const random = createRandom(recipe.seed, streams.targets);
  const visits = emptyVisits();
  const stars = drawStars(random, nTargets, {
    V: { min: 10.5, max: 15 },
    BV: { min: -0.1, max: 1.5 },
    perGroup: nTargets,
  });
  for (let v = 0; v < nTargetFrames; v += 1) {
    addVisit(visits, bands, random, {
      hours: length_hours * ((v + random.uniform()) / nTargetFrames - 0.5),
      airmass: airmass.min + (airmass.max - airmass.min) * random.uniform(),
      stars: Array.from({ length: nTargets }, (_, s) => s),
    });
  }
  const hours = Float64Array.from(visits.hours);
  return {
    plan: { ...simulationInput(recipe, visits, hours), stars, starErrors: equalErrors(nTargets, 0) },
    frameAirmass: Float64Array.from(visits.frameAirmass),
  };
}

type WithoutStars = Omit<SimulationInput, 'stars' | 'starErrors'>;

function simulationInput(recipe: NightRecipe, visits: Visits, hours: Float64Array): WithoutStars {
  const column = (value: number): Float64Array => new Float64Array(hours.length).fill(value);
  return {
    seed: recipe.seed,
    bands: recipe.bands,
    frames: {
      band: Uint8Array.from(visits.band),
      hours,
      exposure_s: column(20),
      fwhm_arcsec: column(2),
      sky: column(20.5),
    },
    observations: {
      frame: Uint32Array.from(visits.frame),
      star: Uint32Array.from(visits.star),
      airmass: Float64Array.from(visits.airmass),
    },
    camera,
  };
}

/** An episode whose middle is the middle of the visit and which touches no other. */
function cloudOver(
  hours: Float64Array,
  { visit, depth }: NonNullable<NightRecipe['cloudyVisit']>,
  nFrames: number,
): { from_hours: number; to_hours: number; depth: number; unevenness: number } {
  const [first, last] = [hours[visit * nFrames]!, hours[(visit + 1) * nFrames - 1]!];
  const margin_hours = 2 * secondsBetweenFrames_hours;
  return { from_hours: first - margin_hours, to_hours: last + margin_hours, depth, unevenness: 0.1 };
}

interface StarSpread {
  readonly V: Range;
  readonly BV: Range;
  /** Colours are spread evenly over each group of so many stars. */
  readonly perGroup: number;
}

function drawStars(random: Random, nStars: number, { V, BV, perGroup }: StarSpread): StarColours {
  const column = (): Float64Array => new Float64Array(nStars);
  const stars = { V: column(), BV: column(), UB: column(), VR: column(), VI: column() };
  for (let s = 0; s < nStars; s += 1) {
    const colour = BV.min + ((BV.max - BV.min) * ((s % perGroup) + random.uniform())) / perGroup;
    stars.V[s] = V.min + (V.max - V.min) * random.uniform();
    stars.BV[s] = colour;
    stars.UB[s] = 1.3 * colour - 0.7 + 0.15 * random.normal();
    stars.VR[s] = 0.57 * colour + 0.03 * random.normal();
    stars.VI[s] = 1.1 * colour + 0.05 * random.normal();
  }
  return stars;
}

/** The numbers 0 … n − 1 in an order by chance (Fisher and Yates). */
function shuffled(n: number, random: Random): readonly number[] {
  const numbers = Array.from({ length: n }, (_, i) => i);
  for (let i = n - 1; i > 0; i -= 1) {
    const j = Math.floor(random.uniform() * (i + 1));
    [numbers[i], numbers[j]] = [numbers[j]!, numbers[i]!];
  }
  return numbers;
}

function standardColumns(plan: SimulationInput, measured: Simulation): StandardObservations {
  const { frame, star, airmass } = plan.observations;
  return {
    night: new Uint16Array(frame.length),
    star,
    frame,
    band: Uint8Array.from(frame, (f) => plan.frames.band[f]!),
    instMag: measured.instMag,
    instErr: measured.instErr,
    airmass,
    hours: Float64Array.from(frame, (f) => plan.frames.hours[f]!),
    overrule: new Uint8Array(frame.length),
    starNames: Array.from(plan.stars.V, (_, s) => `Standard ${s + 1}`),
    frameNumbers: Uint32Array.from(plan.frames.band, (_, f) => f + 1),
    nightNames: ['2026-11-03'],
    standards: plan.stars,
    standardErrors: plan.starErrors,
  };
}

function targetColumns({ plan, frameAirmass }: TargetPlan, measured: Simulation): TargetMeasurements {
  const { frame, star, airmass } = plan.observations;
  const nFrames = plan.frames.band.length;
  return {
    star,
    frame,
    instMag: measured.instMag,
    instErr: measured.instErr,
    airmass,
    saturated: Uint8Array.from(measured.peak_counts, (peak) => (peak > saturation_counts ? 1 : 0)),
    nStars: plan.stars.V.length,
    frameBand: plan.frames.band,
    frameAirmass,
    frameHours: plan.frames.hours,
    frameBjd: plan.frames.hours.map((hours) => bjdOfMeanTime + hours / hoursPerDay),
    frameOffset: new Float64Array(nFrames).fill(Number.NaN),
  };
}

function requireCounts(recipe: NightRecipe): void {
  const { nFields, starsPerField, nVisits, nTargets, nTargetFrames, bands, cloudyVisit } = recipe;
  const isCount = (value: number, least: number): boolean => Number.isInteger(value) && value >= least;
  if (![nFields, starsPerField, nVisits].every((value) => isCount(value, 1)))
    throw new RangeError('A night of standards has a field, a star and a visit.');
  if (![nTargets, nTargetFrames].every((value) => isCount(value, 0)))
    throw new RangeError('Targets and their frames are whole numbers.');
  if (Object.keys(bands).length === 0 || Object.keys(bands).length > nBands)
    throw new RangeError('A night is observed in a band.');
  if (cloudyVisit !== undefined && (!isCount(cloudyVisit.visit, 0) || cloudyVisit.visit >= nVisits))
    throw new RangeError('The cloudy visit is one of the visits.');
}
