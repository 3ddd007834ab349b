import 'server-only';
import { setImmediate as turn } from 'node:timers/promises';
import { airmassAt, exposureSky, type ExposureSky } from '@/lib/astro/exposure-airmass';
import { starTimes } from '@/lib/astro/light-travel';
import { skyMoment } from '@/lib/astro/sky-moment';
import type { AirmassFormula } from '@/lib/astro/airmass';
import type { Site } from '@/lib/astro/site';
import { directionOf } from '@/lib/astro/vector';
import { toScienceName } from '@/lib/contracts/coefficients';
import { AirmassFormula as AirmassFormulaSchema } from '@/lib/contracts/solve-options';
import { Fault } from '@/lib/faults/fault';
import type { BandCalibration, TransformOptions } from '@/lib/photometry/target-measurements';
import { checkNight } from '@/lib/server/data/check-inputs';
import { instrumentOf } from '@/lib/server/data/instruments';
import { findNight } from '@/lib/server/data/nights';
import { bandsOfNight, type BandRow } from '@/lib/server/data/solution-bands';
import { saturationOf, targetFrames, type TargetFrameRow } from '@/lib/server/data/target-tables';
import {
  findTransformedSolution,
  zeroOfHours,
  transformationsOf,
  type TransformationRow,
  type TransformedSolutionRow,
} from '@/lib/server/data/transformation-runs';
import type { JobCaller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';

/** A frame of targets as the transformation needs it; NaN where the log does not tell enough. */
export interface TargetFrame {
  readonly id: number;
  readonly programmeId: number | null;
  /** A frame of standards: in a mixed set its stars are no targets. */
  readonly isStandard: boolean;
  readonly band: TargetFrameRow['band'];
  /** Of its middle. */
  readonly airmass: number;
  /** From which each star on it has an airmass of its own. */
  readonly sky: ExposureSky | null;
  readonly hours: number;
  readonly bjd: number;
}

export interface TransformInputs {
  readonly solution: TransformedSolutionRow;
  readonly nightId: number;
  readonly transformations: readonly TransformationRow[];
  readonly calibrations: readonly BandCalibration[];
  /** The one that the extinction was found with. */
  readonly formula: AirmassFormula;
  readonly frames: readonly TargetFrame[];
  /** [counts]; Infinity where the camera's is not known. */
  readonly saturation: number;
  readonly options: TransformOptions;
}

/** What a transformation is asked with, beside the night's verdict. Common practice, no source. */
const usualOptions = {
  // Middle and half width of the colours of field stars.
  assumedColour: { value: 0.7, error: 0.4 },
  lowSignal: 10,
  largeOffset: 0.1,
} as const;

/** Everything but the measurements themselves, as it is at this moment. */
export async function transformInputs(
  caller: JobCaller,
  payload: { readonly solution: string; readonly night: string },
): Promise<TransformInputs> {
  const [solution, night] = await Promise.all([
    findTransformedSolution(payload.solution),
    findNight(dataScope(caller), payload.night),
  ]);
  if (!solution || !night) throw new Fault('not-found', 'The solution or its night is gone.');
  const { telescopeId } = await checkNight(night.id);
  const [transformations, bands, origin, frames, instrument, saturation] = await Promise.all([
    transformationsOf(solution.id, night.id),
    bandsOfNight(solution.id, night.id),
    zeroOfHours(solution.id, night.id),
    targetFrames(night.id),
    instrumentOf({ telescopeId }),
    saturationOf(telescopeId),
  ]);
  const formula = formulaOf(solution);
  return {
    solution,
    nightId: night.id,
    transformations,
    calibrations: bands.flatMap((band) => calibrationOf(band, origin)),
    formula,
    frames: await allOnSky(frames, { site: instrument, formula, origin }),
    saturation: saturation ?? Number.POSITIVE_INFINITY,
    options: { ...usualOptions, nightWithCare: solution.verdict === 'usable with care' },
  };
}

/** The airmass of the targets must be the one that the extinction was found with. */
function formulaOf({ model }: TransformedSolutionRow): AirmassFormula {
  return AirmassFormulaSchema.parse((model as { readonly airmassFormula?: unknown }).airmassFormula);
}

/** A band for the transformation; none where a coefficient could not be determined. */
function calibrationOf(row: BandRow, origin: Date | null): readonly BandCalibration[] {
  if (origin === null || row.scatterObservation === null) return [];
  const values = row.coefficients.map(({ value }) => value);
  if (values.length === 0 || values.includes(null)) return [];
  return [
    {
      band: row.band,
      names: row.coefficients.map(({ name }) => toScienceName(name)),
      values: Float64Array.from(values, (value) => value ?? NaN),
      covariance: Float64Array.from(row.covariance.flat()),
      scatterObservation: row.scatterObservation,
      scatterFrame: row.scatterFrame ?? 0,
      airmass: { min: row.airmassMin ?? NaN, max: row.airmassMax ?? NaN },
      colour: { min: row.colourMin ?? NaN, max: row.colourMax ?? NaN },
      hours: { min: hoursFrom(origin, row.utcFirst), max: hoursFrom(origin, row.utcLast) },
    },
  ];
}

const hoursFrom = (origin: Date, instant: Date | null): number =>
  instant === null ? NaN : (instant.getTime() - origin.getTime()) / 3_600_000;

interface Sky {
  readonly site: Site;
  readonly formula: AirmassFormula;
  readonly origin: Date | null;
}

/** Frames after which others get their turn: places take some 0.4 ms a frame. */
const slice = 50;

async function allOnSky(frames: readonly TargetFrameRow[], sky: Sky): Promise<readonly TargetFrame[]> {
  const placed: TargetFrame[] = [];
  for (const [index, frame] of frames.entries()) {
    if (index % slice === slice - 1) await turn();
    placed.push(onSky(frame, sky));
  }
  return placed;
}

function onSky(frame: TargetFrameRow, { site, formula, origin }: Sky): TargetFrame {
  const { id, programmeId, band, ra, decl } = frame;
  const hours = origin === null ? NaN : hoursFrom(origin, frame.utcMid);
  const known = { id, programmeId, isStandard: frame.type === 'standard', band, hours };
  if (ra === null || decl === null) return { ...known, airmass: NaN, sky: null, bjd: NaN };
  const place = { longitude: site.longitude, latitude: site.latitude, elevation: site.elevation };
  const bjd = starTimes(skyMoment(place, frame.utcMid.getTime()), ra, decl).bjdTdb;
  const sky = exposureSky(place, { utcStart: frame.utcStart.getTime(), exposure_s: frame.exposure });
  return { ...known, airmass: airmassOrNone(formula, sky, { ra, decl }), sky, bjd };
}

function airmassOrNone(
  formula: AirmassFormula,
  sky: ExposureSky,
  { ra, decl }: { readonly ra: number; readonly decl: number },
): number {
  try {
    return airmassAt(formula, sky, directionOf(ra, decl));
  } catch (error) {
    // Below the horizon, or beyond the formula: the log takes such frames, and a magnitude cannot be had from them.
    if (error instanceof RangeError) return NaN;
    throw error;
  }
}
