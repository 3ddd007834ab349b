import 'server-only';
import { setImmediate as turn } from 'node:timers/promises';
import type { AirmassFormula } from '@/lib/astro/airmass';
import { exposureAirmass } from '@/lib/astro/exposure-airmass';
import type { Site } from '@/lib/astro/site';
import type { SolveFrame } from '@/lib/server/data/solve-inputs';

/** Frames after which others get their turn: places take some 0.2 ms a frame. */
const slice = 50;

/** A frame's airmass, or why it has none, as the end of a sentence that begins with the frame. */
export type FrameAirmass = { readonly airmass: number } | { readonly why: string };

/** Airmass of each frame by the formula, averaged over its exposure. */
export async function frameAirmasses(
  formula: AirmassFormula,
  site: Site,
  frames: readonly SolveFrame[],
): Promise<ReadonlyMap<number, FrameAirmass>> {
  const found = new Map<number, FrameAirmass>();
  for (const [index, frame] of frames.entries()) {
    if (index % slice === slice - 1) await turn();
    found.set(frame.id, airmassOf(formula, site, frame));
  }
  return found;
}

function airmassOf(formula: AirmassFormula, site: Site, frame: SolveFrame): FrameAirmass {
  if (frame.band === null) return { why: 'has no band in the log' };
  if (frame.ra === null || frame.dec === null) return { why: 'has no position in the log' };
  try {
    const { ra, dec, exposure: exposure_s } = frame;
    const utcStart = frame.utcStart.getTime();
    return { airmass: exposureAirmass(formula, { site, ra, dec, utcStart, exposure_s }) };
  } catch (error) {
    // A frame below the horizon, or beyond what the formula holds for: the fit goes on without it and says so.
    if (!(error instanceof RangeError)) throw error;
    return { why: `has no airmass (${error.message.replace(/\.$/, '')})` };
  }
}
