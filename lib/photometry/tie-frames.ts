/**
 * A night that is not photometric, tied to stars measured before: the offset of each frame is found from the secondary
 * standards on it, with colour terms known from elsewhere; `transformTargets` then subtracts it.
 *
 * The offsets take up whatever is grey: cloud, and what the zero point and extinction that are subtracted first get
 * wrong. So of the calibration only the errors of its colour terms remain, and these count from the mean colour of the
 * secondary standards, where they were absorbed too. What the secondary standards get wrong together is common to all
 * frames and goes into the zero point's variance; the rest is each frame's own.
 */
import { bandPlace, colourForBand, magnitudeInBand, nBands, type BandName, type StarColours } from './bands';
import { coefficientOrder } from './fit-model';
import { frameConstants, termsByBand, type BandTerms } from './frame-constants';
import { solveEnsemble, type Ensemble, type EnsembleOptions, type EnsembleSolution } from './solve-ensemble';
import type { BandCalibration, TargetMeasurements } from './target-measurements';

/** Stars of an earlier release, numbered as the stars of the measurements; NaN for all others. */
export interface SecondaryStandards {
  /** Shape (n stars) each. */
  readonly stars: StarColours;
  /** Total errors of their magnitudes in each band, independent between bands, shape (n stars, 5 bands) row-major [mag]. */
  readonly errors: Float64Array;
}

/** Why a frame has no offset, in words that a page shows as they stand. */
export interface TieFinding {
  readonly frame: number;
  readonly kind: 'too-few-secondaries' | 'not-converged';
  readonly reason: string;
  readonly remedy: string;
}

export interface TiedFrames {
  /** With offsets of frames and their own errors; infinite where a frame cannot be tied, so that it is not used. */
  readonly measurements: TargetMeasurements;
  /** What to transform with: values as given, errors as they are once offsets are subtracted. */
  readonly calibrations: readonly BandCalibration[];
  /** Secondary standards that agree on each frame, shape (n frames). */
  readonly nSecondaries: Uint16Array;
  readonly findings: readonly TieFinding[];
}

/** Ties the frames of a night to secondary standards.
 * @param measurements - of all stars; frame offsets in it are not read [mag]
 * @param secondaries - magnitudes, colours and total errors, shape (n stars) each [mag]
 * @param calibrations - colour terms of the equipment, with the site's mean extinction and a zero point where known
 * @param options - secondary standards that a frame needs, tuning of the weights
 * @returns measurements with offsets, calibrations to transform them with, and what could not be tied
 * @throws {RangeError} when fewer than one secondary standard is asked for, or as transformTargets
 * @accuracy errors of the secondary standards' colours are left out: below a tenth of them in the offset
 * @source Honeycutt 1992, PASP 104, 435 (inhomogeneous ensemble); errors: design of this program */
export function tieFrames(
  measurements: TargetMeasurements,
  secondaries: SecondaryStandards,
  calibrations: readonly BandCalibration[],
  options: EnsembleOptions,
): TiedFrames {
  if (!(options.leastStars >= 1)) throw new RangeError('A frame is tied by at least one secondary standard.');
  const nFrames = measurements.frameBand.length;
  const nan = (): Float64Array => new Float64Array(nFrames).fill(Number.NaN);
  const untied = { ...measurements, frameOffset: nan() };
  const tied = { ...measurements, frameOffset: nan(), frameOffsetErr: nan() };
  const terms = termsByBand(calibrations);
  const nSecondaries = new Uint16Array(nFrames);
  const findings: TieFinding[] = [];
  const stays = calibrations.map((calibration) => {
    const rows = bandRows(untied, secondaries, terms, calibration.band);
    const solution = solveEnsemble(rows.ensemble, options);
    const common = commonVariance(solution);
    rows.frames.forEach((f, local) => {
      nSecondaries[f] = solution.nStars[local]!;
      const own = solution.covariance[local * rows.frames.length + local]! - common;
      if (solution.converged && !Number.isNaN(solution.offset[local]!)) {
        tied.frameOffset[f] = solution.offset[local]!;
        tied.frameOffsetErr[f] = Math.sqrt(Math.max(0, own));
      } else {
        tied.frameOffset[f] = Number.POSITIVE_INFINITY;
        findings.push(findingOf(f, solution, nSecondaries[f]!, options));
      }
    });
    return tiedCalibration(calibration, terms[bandPlace[calibration.band]]!, rows, common);
  });
  return { measurements: tied, calibrations: stays, nSecondaries, findings };
}

interface BandRows {
  readonly ensemble: Ensemble;
  /** Numbers of the band's frames. */
  readonly frames: readonly number[];
  /** Weighted means of colour and of its square over the secondary standards' measurements [mag, mag²]. */
  readonly meanColour: number;
  readonly meanSquare: number;
}

/** Measurements of secondary standards in one band, less what is known of star and band. */
function bandRows(
  measurements: TargetMeasurements,
  { stars, errors }: SecondaryStandards,
  terms: readonly (BandTerms | undefined)[],
  band: BandName,
): BandRows {
  const place = bandPlace[band];
  const { colourTerm, secondOrderExtinction, colourTerm2 } = terms[place]!.coefficients;
  const constants = frameConstants(measurements, terms, { largeOffset: Number.POSITIVE_INFINITY });
  const { frame, star, instMag, instErr, saturated, airmass, frameBand, frameAirmass } = measurements;
  const frames = Array.from(frameBand).flatMap((b, f) => (b === place ? [f] : []));
  const localFrame = new Map(frames.map((f, local) => [f, local] as const));
  const localStar = new Map<number, number>();
  const rows = { frame: [] as number[], star: [] as number[], y: [] as number[], variance: [] as number[] };
  const tau: number[] = [];
  let [weight, first, second] = [0, 0, 0];
  for (let m = 0; m < frame.length; m += 1) {
    const f = frame[m]!;
    const s = star[m]!;
    if (frameBand[f] !== place || saturated[m] !== 0 || !(instErr[m]! > 0)) continue;
    const X = airmass?.[m] ?? frameAirmass[f]!;
    const C = colourForBand(stars, s, place);
    const known =
      magnitudeInBand(stars, s, place) + (colourTerm + secondOrderExtinction * X + colourTerm2 * C) * C;
    const y = instMag[m]! - constants.constant[f]! - constants.perAirmass[f]! * X - known;
    const starErr = errors[s * nBands + place]!;
    if (!Number.isFinite(y) || !(starErr > 0)) continue;
    if (!localStar.has(s)) {
      localStar.set(s, tau.length);
      tau.push(starErr);
    }
    const variance = instErr[m]! ** 2 + terms[place]!.calibration.scatterObservation ** 2;
    rows.frame.push(localFrame.get(f)!);
    rows.star.push(localStar.get(s)!);
    rows.y.push(y);
    rows.variance.push(variance);
    const w = 1 / (variance + starErr ** 2);
    weight += w;
    first += w * C;
    second += w * C * C;
  }
  return {
    ensemble: {
      nFrames: frames.length,
      nStars: tau.length,
      frame: Int32Array.from(rows.frame),
      star: Int32Array.from(rows.star),
      y: Float64Array.from(rows.y),
      variance: Float64Array.from(rows.variance),
      tau: Float64Array.from(tau),
    },
    frames,
    meanColour: weight === 0 ? 0 : first / weight,
    meanSquare: weight === 0 ? 0 : second / weight,
  };
}

/** What the offsets of all frames have in common: the mean of their covariances. */
function commonVariance({ offset, covariance }: EnsembleSolution): number {
  const n = offset.length;
  const tied = Array.from(offset.keys()).filter((f) => !Number.isNaN(offset[f]!));
  if (tied.length < 2) return 0;
  let sum = 0;
  for (const f of tied) for (const g of tied) if (f !== g) sum += covariance[f * n + g]!;
  return Math.max(0, sum / (tied.length * (tied.length - 1)));
}

/** The covariance that stays: errors of colour terms about the mean colour, and the common error of the offsets. */
function tiedCalibration(
  calibration: BandCalibration,
  { covariance }: BandTerms,
  { meanColour, meanSquare }: BandRows,
  common: number,
): BandCalibration {
  const p = coefficientOrder.length;
  const place = (name: (typeof coefficientOrder)[number]): number => coefficientOrder.indexOf(name);
  // Derivatives of the errors that stay by those of the colour terms.
  const stays = new Float64Array(p * p);
  const [T, k2, T2] = [place('colourTerm'), place('secondOrderExtinction'), place('colourTerm2')];
  for (const column of [T, k2, T2]) stays[column * p + column] = 1;
  stays[place('zeroPoint') * p + T] = -meanColour;
  stays[place('zeroPoint') * p + T2] = -meanSquare;
  stays[place('extinction') * p + k2] = -meanColour;
  const propagated = new Float64Array(p * p);
  for (let i = 0; i < p; i += 1) {
    for (let j = 0; j < p; j += 1) {
      let sum = i === j && i === place('zeroPoint') ? common : 0;
      for (let k = 0; k < p; k += 1)
        for (let l = 0; l < p; l += 1) sum += stays[i * p + k]! * covariance[k * p + l]! * stays[j * p + l]!;
      propagated[i * p + j] = sum;
    }
  }
  const values = new Float64Array(p);
  calibration.names.forEach((name, i) => (values[place(name)] = calibration.values[i]!));
  return { ...calibration, names: coefficientOrder, values, covariance: propagated };
}

function findingOf(
  frame: number,
  { converged }: EnsembleSolution,
  found: number,
  { leastStars }: EnsembleOptions,
): TieFinding {
  if (!converged) {
    return {
      frame,
      kind: 'not-converged',
      reason: 'The offsets of the frames in this band do not settle.',
      remedy: 'Look at the secondary standards: some of them contradict each other.',
    };
  }
  const stars = found === 1 ? '1 secondary standard agrees' : `${found} secondary standards agree`;
  return {
    frame,
    kind: 'too-few-secondaries',
    reason: `${stars} on this frame, and ${leastStars} are needed.`,
    remedy: 'Leave the frame out, or measure more stars of an earlier release on it.',
  };
}
