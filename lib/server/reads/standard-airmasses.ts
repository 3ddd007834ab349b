import 'server-only';
import { setImmediate as turn } from 'node:timers/promises';
import type { AirmassFormula } from '@/lib/astro/airmass';
import { airmassAt, exposureSky, type ExposureSky } from '@/lib/astro/exposure-airmass';
import { placeAfter, yearsSinceJ2000 } from '@/lib/astro/proper-motion';
import type { Site } from '@/lib/astro/site';
import { directionOf } from '@/lib/astro/vector';
import type { PublishedStar, SolveFrame, StandardColumns } from '@/lib/server/data/solve-inputs';

/** Frames after which others get their turn: their skies take some 0.2 ms each. */
const slice = 50;

export interface StandardAirmasses {
  /** Of each row, its star where it was published, moved to the night, over the exposure; NaN without, shape (n). */
  readonly airmass: Float64Array;
  /** Why rows of a frame have none, as the end of a sentence that begins with the frame; by the frame's id. */
  readonly why: ReadonlyMap<number, string>;
}

interface Observed {
  readonly rows: StandardColumns;
  readonly frames: readonly SolveFrame[];
  readonly stars: readonly PublishedStar[];
}

/** Airmass of each observation of a standard by the formula; none on frames that are not among those given. */
export async function standardAirmasses(
  formula: AirmassFormula,
  site: Site,
  { rows, frames, stars }: Observed,
): Promise<StandardAirmasses> {
  const airmass = new Float64Array(rows.frameId.length).fill(NaN);
  const why = new Map<number, string>();
  const skies = await skiesOf(site, frames);
  const starOf = new Map(stars.map((star) => [star.id, star]));
  for (const [row, frameId] of rows.frameId.entries()) {
    const found = skies.get(frameId);
    const star = starOf.get(rows.standardId[row] ?? 0);
    if (!found || !star) continue;
    if (found.frame.band === null) why.set(frameId, 'has no band in the log');
    else airmass[row] = airmassOrWhy(formula, star, found, (reason) => why.set(frameId, reason));
  }
  return { airmass, why };
}

interface FrameSky {
  readonly frame: SolveFrame;
  readonly sky: ExposureSky;
}

async function skiesOf(
  { longitude, latitude, elevation }: Site,
  frames: readonly SolveFrame[],
): Promise<ReadonlyMap<number, FrameSky>> {
  const skies = new Map<number, FrameSky>();
  for (const [index, frame] of frames.entries()) {
    if (index % slice === slice - 1) await turn();
    const exposure = { utcStart: frame.utcStart.getTime(), exposure_s: frame.exposure };
    skies.set(frame.id, { frame, sky: exposureSky({ longitude, latitude, elevation }, exposure) });
  }
  return skies;
}

function airmassOrWhy(
  formula: AirmassFormula,
  star: PublishedStar,
  { frame, sky }: FrameSky,
  say: (reason: string) => void,
): number {
  const years = yearsSinceJ2000(frame.utcMid.getTime());
  const motion = { pmRa: star.pmRa ?? NaN, pmDec: star.pmDec ?? NaN };
  const { ra, dec } = placeAfter(star, motion, years);
  try {
    return airmassAt(formula, sky, directionOf(ra, dec));
  } catch (error) {
    // A star below the horizon, or beyond what the formula holds for: the fit goes on without it and says so.
    if (!(error instanceof RangeError)) throw error;
    say(`has no airmass (${error.message.replace(/\.$/, '')})`);
    return NaN;
  }
}
