import { type BandName } from '@/lib/photometry/bands';
import {
  bandPlaces,
  simulate,
  type Disturbances,
  type SimulatedBand,
  type Simulation,
} from '@/lib/photometry/simulate';
import { createRandom } from '@/lib/numerics/random';
import { type StandardObservations } from '@/lib/photometry/standard-observations';

/** A night of standards as a small telescope takes it: fields of stars of mixed colour, low and high, in turn. */
export interface NightPlan {
  readonly seed: number;
  readonly bands: readonly BandName[];
  /** Frames in each band. */
  readonly frames: number;
  readonly starsPerFrame: number;
  readonly fields: number;
  readonly airmass: readonly [number, number];
  readonly colour: readonly [number, number];
  /** Length of the night [h]. */
  readonly length_hours: number;
  readonly starError: number;
  readonly disturbances?: Disturbances;
  readonly truth: Partial<Record<BandName, Partial<SimulatedBand>>>;
}

export const usualPlan: NightPlan = {
  seed: 1,
  bands: ['V'],
  frames: 24,
  starsPerFrame: 8,
  fields: 6,
  airmass: [1.05, 2.1],
  colour: [-0.2, 1.6],
  length_hours: 8,
  starError: 0.003,
  truth: {},
};

export const usualTruth = {
  U: { zeroPoint: 4.6, extinction: 0.5, colourTerm: -0.06 },
  B: { zeroPoint: 2.9, extinction: 0.27, colourTerm: 0.09, secondOrderExtinction: -0.03 },
  V: { zeroPoint: 2.5, extinction: 0.15, colourTerm: -0.05 },
  R: { zeroPoint: 2.6, extinction: 0.1, colourTerm: -0.03 },
  I: { zeroPoint: 3.1, extinction: 0.06, colourTerm: 0.02 },
} as const satisfies Record<BandName, Partial<SimulatedBand>>;

/** What every band is in the simulation where the plan says nothing else. */
export function truthOf(plan: NightPlan, band: BandName): SimulatedBand {
  return {
    secondOrderExtinction: 0,
    drift: 0,
    extinctionDrift: 0,
    colourTerm2: 0,
    scatterObservation: 0.006,
    scatterFrame: 0.005,
    ...usualTruth[band],
    ...plan.truth[band],
  };
}

export interface SimulatedNight {
  readonly observations: StandardObservations;
  readonly simulation: Simulation;
  readonly truth: Partial<Record<BandName, SimulatedBand>>;
}

/** Takes the night. The same seed gives the same night. */
export function standardNight(change: Partial<NightPlan> = {}): SimulatedNight {
  const plan = { ...usualPlan, ...change };
  const random = createRandom(plan.seed, 77);
  const between = ([from, to]: readonly [number, number]): number => from + (to - from) * random.uniform();
  const nStars = plan.fields * plan.starsPerFrame;
  const column = (value: () => number): Float64Array => Float64Array.from({ length: nStars }, value);
  const errors = (): Float64Array => column(() => plan.starError);
  const BV = column(() => between(plan.colour));
  const stars = {
    V: column(() => 10 + 3 * random.uniform()),
    BV,
    UB: BV.map((c) => 0.9 * c - 0.2 + 0.1 * random.normal()),
    VR: BV.map((c) => 0.55 * c),
    VI: BV.map((c) => 1.1 * c),
  };
  const frameBands: BandName[] = [];
  const hours: number[] = [];
  const fields: number[] = [];
  const airmasses: number[] = [];
  for (let k = 0; k < plan.frames; k += 1) {
    const X = between(plan.airmass);
    for (const [b, band] of plan.bands.entries()) {
      frameBands.push(band);
      fields.push(k % plan.fields);
      hours.push(plan.length_hours * ((k + b / plan.bands.length) / plan.frames - 0.5));
      airmasses.push(X);
    }
  }
  const frame = frameBands.flatMap((_, f) => new Array<number>(plan.starsPerFrame).fill(f));
  const star = frame.map((f, o) => (fields[f] ?? 0) * plan.starsPerFrame + (o % plan.starsPerFrame));
  const airmass = Float64Array.from(frame, (f) => (airmasses[f] ?? 1) + 0.01 * random.normal());
  const perFrame = (value: number): Float64Array => new Float64Array(frameBands.length).fill(value);
  const truth = Object.fromEntries(plan.bands.map((band) => [band, truthOf(plan, band)]));
  const standardErrors = {
    V: errors(),
    BV: column(() => 0),
    UB: column(() => 0),
    VR: column(() => 0),
    VI: column(() => 0),
  };
  const simulation = simulate({
    seed: plan.seed,
    bands: truth,
    frames: {
      band: bandPlaces(frameBands),
      hours: Float64Array.from(hours),
      exposure_s: perFrame(60),
      fwhm_arcsec: perFrame(2),
      sky: perFrame(20.5),
    },
    stars,
    starErrors: standardErrors,
    observations: { frame: Uint32Array.from(frame), star: Uint32Array.from(star), airmass },
    camera: { pixelScale_arcsec: 0.5, gain: 1.5, readNoise: 8, darkCurrent: 0.01, magnitudeConstant: 25 },
    ...(plan.disturbances ? { disturbances: plan.disturbances } : {}),
  });
  return {
    simulation,
    truth,
    observations: {
      night: new Uint16Array(frame.length),
      star: Uint32Array.from(star),
      frame: Uint32Array.from(frame),
      band: Uint8Array.from(frame, (f) => bandPlaces(frameBands)[f] ?? 0),
      instMag: simulation.instMag,
      instErr: simulation.instErr,
      airmass,
      hours: Float64Array.from(frame, (f) => hours[f] ?? 0),
      overrule: new Uint8Array(frame.length),
      starNames: Array.from({ length: nStars }, (_, s) => `S${s + 1}`),
      frameNumbers: Uint32Array.from(frameBands, (_, f) => f + 1),
      nightNames: ['2026-03-14'],
      standards: stars,
      standardErrors,
    },
  };
}

/** Several nights as one set of observations; each keeps stars and frames of its own. */
export function joinNights(nights: readonly StandardObservations[]): StandardObservations {
  const [first] = nights;
  if (first === undefined) throw new Error('There is no night.');
  const floats = (of: (night: StandardObservations) => Float64Array): Float64Array =>
    Float64Array.from(nights.flatMap((night) => [...of(night)]));
  const shifted = (
    of: (night: StandardObservations) => Uint32Array,
    lengthOf: (night: StandardObservations) => number,
  ): Uint32Array => {
    let before = 0;
    return Uint32Array.from(
      nights.flatMap((night) => {
        const places = Array.from(of(night), (place) => place + before);
        before += lengthOf(night);
        return places;
      }),
    );
  };
  const published = (of: 'standards' | 'standardErrors'): StandardObservations['standards'] => ({
    V: floats((night) => night[of].V),
    BV: floats((night) => night[of].BV),
    UB: floats((night) => night[of].UB),
    VR: floats((night) => night[of].VR),
    VI: floats((night) => night[of].VI),
  });
  return {
    night: Uint16Array.from(nights.flatMap(({ band }, k) => Array.from(band, () => k))),
    star: shifted(
      ({ star }) => star,
      ({ starNames }) => starNames.length,
    ),
    frame: shifted(
      ({ frame }) => frame,
      ({ frameNumbers }) => frameNumbers.length,
    ),
    band: Uint8Array.from(nights.flatMap(({ band }) => [...band])),
    instMag: floats(({ instMag }) => instMag),
    instErr: floats(({ instErr }) => instErr),
    airmass: floats(({ airmass }) => airmass),
    hours: floats(({ hours }) => hours),
    overrule: Uint8Array.from(nights.flatMap(({ overrule }) => [...overrule])),
    starNames: nights.flatMap(({ starNames }) => starNames),
    frameNumbers: Uint32Array.from(nights.flatMap(({ frameNumbers }) => [...frameNumbers])),
    nightNames: nights.map((_, k) => `2026-03-${14 + k}`),
    standards: published('standards'),
    standardErrors: published('standardErrors'),
  };
}

/** The same observations in another order, or some of them left out: `order` names the ones to take. */
export function takeObservations(from: StandardObservations, order: readonly number[]): StandardObservations {
  const at = <T>(column: ArrayLike<T>): T[] => order.map((o) => column[o] as T);
  return {
    ...from,
    night: Uint16Array.from(at(from.night)),
    star: Uint32Array.from(at(from.star)),
    frame: Uint32Array.from(at(from.frame)),
    band: Uint8Array.from(at(from.band)),
    instMag: Float64Array.from(at(from.instMag)),
    instErr: Float64Array.from(at(from.instErr)),
    airmass: Float64Array.from(at(from.airmass)),
    hours: Float64Array.from(at(from.hours)),
    overrule: Uint8Array.from(at(from.overrule)),
  };
}
