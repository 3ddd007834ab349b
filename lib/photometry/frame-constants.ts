/** What the measurements of a frame have in common before any star is known, worked out once per frame. */
import { bandOrder, bandPlace, nBands } from './bands';
import { calibratedFlags } from './calibrated-flags';
import { coefficientOrder } from './fit-model';
import type { BandCalibration, TargetMeasurements, TransformOptions } from './target-measurements';
import type { BandCoefficients } from './transformation-model';

/** A calibration with a place for every coefficient: those absent are zero without error. */
export interface BandTerms {
  readonly coefficients: BandCoefficients;
  /** In coefficientOrder, shape (7, 7) row-major. */
  readonly covariance: Float64Array;
  readonly calibration: BandCalibration;
}

/** Shape (n frames) each. */
export interface FrameConstants {
  /** Z + tau·t + offset [mag]; NaN where the band has no calibration or something is unknown. */
  readonly constant: Float64Array;
  /** k1 + kappa·t [mag per airmass] */
  readonly perAirmass: Float64Array;
  /** What is added to the variance of each measurement [mag²]. */
  readonly variance: Float64Array;
  /** Bits of calibratedFlags that every measurement on the frame earns. */
  readonly flags: Uint16Array;
}

/** Calibrations by place of their band, with all coefficients.
 * @param calibrations - at most one for each band
 * @returns terms, shape (5 bands); undefined where a band is not calibrated
 * @throws {RangeError} when a band comes twice or arrays disagree in length
 * @accuracy exact
 * @source definition of this program */
export function termsByBand(calibrations: readonly BandCalibration[]): readonly (BandTerms | undefined)[] {
  const terms = new Array<BandTerms | undefined>(nBands).fill(undefined);
  for (const calibration of calibrations) {
    const { band, names, values, covariance } = calibration;
    const p = names.length;
    if (terms[bandPlace[band]] !== undefined) throw new RangeError(`Band ${band} is calibrated twice.`);
    if (values.length !== p || covariance.length !== p * p) {
      throw new RangeError(`The coefficients of band ${band} and their covariance differ in length.`);
    }
    const places = names.map((name) => coefficientOrder.indexOf(name));
    const full = new Float64Array(coefficientOrder.length ** 2);
    const value = new Float64Array(coefficientOrder.length);
    for (let i = 0; i < p; i += 1) {
      value[places[i]!] = values[i]!;
      for (let j = 0; j < p; j += 1) {
        full[places[i]! * coefficientOrder.length + places[j]!] = covariance[i * p + j]!;
      }
    }
    const [zeroPoint, extinction, colourTerm, secondOrderExtinction, drift, extinctionDrift, colourTerm2] =
      value as unknown as [number, number, number, number, number, number, number];
    terms[bandPlace[band]] = {
      coefficients: {
        zeroPoint,
        extinction,
        colourTerm,
        secondOrderExtinction,
        drift,
        extinctionDrift,
        colourTerm2,
      },
      covariance: full,
      calibration,
    };
  }
  return terms;
}

/** The constants of every frame.
 * @param measurements - of which the frames are read
 * @param terms - calibrations by place of band, shape (5 bands)
 * @param options - of which the large offset is read [mag]
 * @returns constants, shape (n frames) each [mag, mag², 1]
 * @throws {RangeError} when a frame's band does not exist
 * @accuracy exact
 * @source photometric model: see transformation-model.ts */
export function frameConstants(
  measurements: TargetMeasurements,
  terms: readonly (BandTerms | undefined)[],
  options: Pick<TransformOptions, 'largeOffset'>,
): FrameConstants {
  const { frameBand, frameHours, frameOffset, frameOffsetErr } = measurements;
  const n = frameBand.length;
  const constants = {
    constant: new Float64Array(n).fill(Number.NaN),
    perAirmass: new Float64Array(n),
    variance: new Float64Array(n),
    flags: new Uint16Array(n),
  };
  for (let f = 0; f < n; f += 1) {
    const band = frameBand[f]!;
    if (band >= bandOrder.length)
      throw new RangeError(`Frame ${f} is in band ${band}, which does not exist.`);
    const term = terms[band];
    if (term === undefined) continue;
    const { coefficients: c, calibration } = term;
    const t = frameHours[f]!;
    const isTied = !Number.isNaN(frameOffset[f]!);
    const offset = isTied ? frameOffset[f]! : 0;
    constants.constant[f] = c.zeroPoint + c.drift * t + offset;
    constants.perAirmass[f] = c.extinction + c.extinctionDrift * t;
    // A known offset holds what the frame shares; what stays is the error of that offset.
    const offsetErr = isTied ? (frameOffsetErr?.[f] ?? Number.NaN) : Number.NaN;
    const frameScatter = Number.isNaN(offsetErr) ? calibration.scatterFrame : offsetErr;
    constants.variance[f] = calibration.scatterObservation ** 2 + frameScatter ** 2;
    let flags = 0;
    if (t < calibration.hours.min || t > calibration.hours.max) flags |= 1 << calibratedFlags.time_range.bit;
    if (Math.abs(offset) > options.largeOffset) flags |= 1 << calibratedFlags.frame_offset.bit;
    constants.flags[f] = flags;
  }
  return constants;
}
