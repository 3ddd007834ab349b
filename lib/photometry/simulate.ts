/**
 * Forward model of a night: what a telescope would have measured, with the truth beside it. For observation o of star s
 * on frame f in band b:
 *
 *     m_inst = M_b + offset(X, C, t) + delta_sb + eta_f + cloud_f + variation_o + outlier_o + e_o
 *
 * | symbol | name | what it is |
 * |---|---|---|
 * | offset | instrumentalOffset | the transformation of transformation-model.ts |
 * | delta_sb | starOffset | error of the published magnitude: one value per star and band for the whole night |
 * | eta_f | frameOffset | what a frame shares, normal with scatterFrame |
 * | cloud_f | cloud | grey extinction by clouds, of the episodes given |
 * | e_o | noise | normal with variance instErr² + scatterObservation² |
 *
 * Everything random comes from the seed. Each part draws from a stream of its own, so that a further outlier does not
 * move the noise of the other observations. Magnitude errors are taken as normal, which holds for S/N above about 5.
 */
import { createRandom, type Random } from '@/lib/numerics/random';
import {
  bandOrder,
  bandPlace,
  colourForBand,
  magnitudeInBand,
  nBands,
  type BandName,
  type StarColours,
} from './bands';
import { magnitudePerRelativeFlux, signalToNoise } from './ccd-noise';
import { cloudOffsets, type CloudEpisode } from './simulate-clouds';
import { instrumentalOffset, type BandCoefficients } from './transformation-model';

/** True behaviour of one band in one night. */
export interface SimulatedBand extends BandCoefficients {
  /** Scatter of single observations beyond their measurement error [mag]. */
  readonly scatterObservation: number;
  /** Scatter of what a frame shares [mag]. */
  readonly scatterFrame: number;
}

/** Frames, shape (n frames) each. */
export interface SimulatedFrames {
  /** Place in bandOrder. */
  readonly band: Uint8Array;
  /** Mid-exposure, hours from the zero of time of the coefficients. */
  readonly hours: Float64Array;
  readonly exposure_s: Float64Array;
  readonly fwhm_arcsec: Float64Array;
  /** Sky brightness above the atmosphere's extinction [mag per square arcsec]. */
  readonly sky: Float64Array;
}

/** Which star was measured on which frame, shape (n observations) each. */
export interface SimulatedObservations {
  readonly frame: Uint32Array;
  readonly star: Uint32Array;
  readonly airmass: Float64Array;
  /** What a variable star was fainter than its mean [mag]; none when absent. */
  readonly variation?: Float64Array;
}

export interface SimulatedCamera {
  readonly pixelScale_arcsec: number;
  /** Electrons per count. */
  readonly gain: number;
  /** Electrons. */
  readonly readNoise: number;
  /** Electrons per pixel and second. */
  readonly darkCurrent: number;
  /** Instrumental magnitude of one count per second. */
  readonly magnitudeConstant: number;
}

/** What goes wrong; nothing when a part is absent. */
export interface Disturbances {
  readonly clouds?: readonly CloudEpisode[];
  /** A star in whose place another one was measured. */
  readonly misidentified?: readonly {
    readonly star: number;
    readonly measured: Readonly<Record<keyof StarColours, number>>;
  }[];
  /** A fraction of gross errors of either sign, with sizes spread evenly. */
  readonly outliers?: { readonly fraction: number; readonly smallest: number; readonly largest: number };
}

export interface SimulationInput {
  readonly seed: number;
  readonly bands: Readonly<Partial<Record<BandName, SimulatedBand>>>;
  readonly frames: SimulatedFrames;
  /** As published, or as they are for stars whose errors are zero. */
  readonly stars: StarColours;
  /** Standard errors of the published values [mag]. */
  readonly starErrors: StarColours;
  readonly observations: SimulatedObservations;
  readonly camera: SimulatedCamera;
  readonly disturbances?: Disturbances;
}

export interface Simulation {
  /** Shape (n observations) each. `peak_counts` is the brightest pixel, sky included. */
  readonly instMag: Float64Array;
  readonly instErr: Float64Array;
  readonly sky_counts: Float64Array;
  readonly peak_counts: Float64Array;
  readonly truth: {
    /** Instrumental magnitude without noise and outlier, shape (n observations). */
    readonly instMag: Float64Array;
    /** Shape (n observations); zero for all but outliers. */
    readonly outlier: Float64Array;
    /** Shape (n stars, 5 bands), row-major. */
    readonly starOffset: Float64Array;
    /** Shape (n frames). */
    readonly frameOffset: Float64Array;
    /** Shape (n frames). */
    readonly cloud: Float64Array;
  };
}

const streams = { stars: 0, frames: 1, noise: 2, outliers: 3, clouds: 4 } as const;
/** Radius of the aperture in units of the width of star images, and pixels of the background per pixel in the aperture. */
const apertureRadius_fwhm = 1.5;
const backgroundPerAperture = 5;

/** Measures every observation given, with noise, and keeps the truth.
 * @param input - truth per band, frames, stars, observations, camera and disturbances; arrays as the types say [mag, s, h, arcsec]
 * @returns instrumental magnitudes with errors, shape (n observations), and the truth [mag]
 * @throws {RangeError} when arrays disagree in length, or an observation names a frame, star, band or colour that is not there
 * @accuracy exact for the model above; image profile for the peak is a Gaussian
 * @source the model: design of this program; noise of aperture photometry: see ccd-noise.ts */
export function simulate(input: SimulationInput): Simulation {
  const { frames, observations, disturbances = {} } = input;
  requireEqualLengths(input);
  const n = observations.frame.length;
  const measured = withMisidentified(input.stars, disturbances.misidentified ?? []);
  const starOffset = starOffsets(input.starErrors, createRandom(input.seed, streams.stars));
  const frameOffset = frameOffsets(input, createRandom(input.seed, streams.frames));
  const cloud = cloudOffsets(
    frames.hours,
    disturbances.clouds ?? [],
    createRandom(input.seed, streams.clouds),
  );
  const outlier = outlierOffsets(n, disturbances.outliers, createRandom(input.seed, streams.outliers));
  const noise = createRandom(input.seed, streams.noise);
  const columns = {
    instMag: new Float64Array(n),
    instErr: new Float64Array(n),
    sky_counts: new Float64Array(n),
    peak_counts: new Float64Array(n),
  };
  const trueMag = new Float64Array(n);
  for (let o = 0; o < n; o += 1) {
    const f = observations.frame[o]!;
    const s = observations.star[o]!;
    const band = bandOf(input, f);
    const colour = colourForBand(measured, s, frames.band[f]!);
    const state = { airmass: observations.airmass[o]!, colour, hours: frames.hours[f]! };
    const mag =
      magnitudeInBand(measured, s, frames.band[f]!) +
      instrumentalOffset(band, state) +
      starOffset[s * nBands + frames.band[f]!]! +
      frameOffset[f]! +
      cloud[f]! +
      (observations.variation?.[o] ?? 0);
    if (!Number.isFinite(mag))
      throw new RangeError(`Observation ${o} has no magnitude: a colour or an airmass is missing.`);
    const { error, sky, peak } = measure(mag, band, f, input);
    trueMag[o] = mag;
    columns.instErr[o] = error;
    columns.sky_counts[o] = sky;
    columns.peak_counts[o] = peak;
    columns.instMag[o] = mag + outlier[o]! + noise.normal() * Math.hypot(error, band.scatterObservation);
  }
  return { ...columns, truth: { instMag: trueMag, outlier, starOffset, frameOffset, cloud } };
}

function requireEqualLengths({ frames, stars, starErrors, observations }: SimulationInput): void {
  const groups: Readonly<Record<string, readonly ArrayLike<number>[]>> = {
    frames: [frames.band, frames.hours, frames.exposure_s, frames.fwhm_arcsec, frames.sky],
    stars: [stars, starErrors].flatMap(({ V, BV, UB, VR, VI }) => [V, BV, UB, VR, VI]),
    observations: [
      observations.frame,
      observations.star,
      observations.airmass,
      observations.variation ?? observations.star,
    ],
  };
  for (const [name, columns] of Object.entries(groups)) {
    if (columns.some(({ length }) => length !== columns[0]!.length)) {
      throw new RangeError(`The columns of the ${name} differ in length.`);
    }
  }
  const fits = (places: Uint32Array, count: number): boolean => places.every((place) => place < count);
  if (!fits(observations.frame, frames.band.length) || !fits(observations.star, stars.V.length)) {
    throw new RangeError('An observation names a frame or a star that does not exist.');
  }
}

function bandOf({ frames, bands }: SimulationInput, frame: number): SimulatedBand {
  const name = bandOrder[frames.band[frame]!];
  const band = name === undefined ? undefined : bands[name];
  if (band === undefined) throw new RangeError(`Frame ${frame} is in a band without coefficients.`);
  return band;
}

function withMisidentified(
  stars: StarColours,
  swaps: NonNullable<Disturbances['misidentified']>,
): StarColours {
  if (swaps.length === 0) return stars;
  const copy = {
    V: stars.V.slice(),
    BV: stars.BV.slice(),
    UB: stars.UB.slice(),
    VR: stars.VR.slice(),
    VI: stars.VI.slice(),
  };
  for (const { star, measured } of swaps) {
    for (const name of Object.keys(copy) as (keyof StarColours)[]) copy[name][star] = measured[name];
  }
  return copy;
}

/** Errors of published values belong to V and the colours; a band's magnitude inherits them as it is made of them. */
function starOffsets(errors: StarColours, random: Random): Float64Array {
  const n = errors.V.length;
  const offsets = new Float64Array(n * nBands);
  for (let s = 0; s < n; s += 1) {
    const draw = (error: Float64Array): number =>
      random.normal() * (Number.isFinite(error[s]!) ? error[s]! : 0);
    const drawn = [
      draw(errors.V),
      draw(errors.BV),
      draw(errors.UB),
      draw(errors.VR),
      draw(errors.VI),
    ] as const;
    const [v, bv, ub, vr, vi] = drawn;
    offsets.set([v + bv + ub, v + bv, v, v - vr, v - vi], s * nBands);
  }
  return offsets;
}

function frameOffsets(input: SimulationInput, random: Random): Float64Array {
  return Float64Array.from(input.frames.band, (_band, f) => random.normal() * bandOf(input, f).scatterFrame);
}

function outlierOffsets(n: number, outliers: Disturbances['outliers'], random: Random): Float64Array {
  const offsets = new Float64Array(n);
  if (outliers === undefined) return offsets;
  for (let o = 0; o < n; o += 1) {
    const [chance, sign, size] = [random.uniform(), random.uniform(), random.uniform()];
    if (chance >= outliers.fraction) continue;
    offsets[o] = (sign < 0.5 ? -1 : 1) * (outliers.smallest + size * (outliers.largest - outliers.smallest));
  }
  return offsets;
}

/** Error, sky and brightest pixel of a star of this instrumental magnitude on this frame. */
function measure(
  mag: number,
  band: SimulatedBand,
  frame: number,
  { frames, camera }: SimulationInput,
): { readonly error: number; readonly sky: number; readonly peak: number } {
  const exposure = frames.exposure_s[frame]!;
  const counts = (instMag: number): number => exposure * 10 ** (-0.4 * (instMag - camera.magnitudeConstant));
  const fwhm_px = frames.fwhm_arcsec[frame]! / camera.pixelScale_arcsec;
  const sky = counts(frames.sky[frame]! + band.zeroPoint) * camera.pixelScale_arcsec ** 2;
  const nPixels = Math.PI * (apertureRadius_fwhm * fwhm_px) ** 2;
  const star = counts(mag);
  const snr = signalToNoise(star * camera.gain, {
    nPixels,
    nBackground: backgroundPerAperture * nPixels,
    sky: sky * camera.gain,
    dark: camera.darkCurrent * exposure,
    readNoise: camera.readNoise,
    gain: camera.gain,
  });
  const peak = sky + (star * 4 * Math.LN2) / (Math.PI * fwhm_px ** 2);
  return { error: magnitudePerRelativeFlux / snr, sky, peak };
}

/** Standard errors for stars where each error is the same.
 * @param n - number of stars [1]
 * @param error - of every magnitude and colour [mag]
 * @returns errors, shape (n) each [mag]
 * @source definition */
export function equalErrors(n: number, error: number): StarColours {
  const column = (): Float64Array => new Float64Array(n).fill(error);
  return { V: column(), BV: column(), UB: column(), VR: column(), VI: column() };
}

/** Places in bandOrder of bands by name.
 * @param names - of bands, shape (n)
 * @returns places, shape (n) [1]
 * @source definition */
export function bandPlaces(names: readonly BandName[]): Uint8Array {
  return Uint8Array.from(names, (name) => bandPlace[name]);
}
