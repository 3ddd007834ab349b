import type { NextFrame } from '@/lib/contracts/api/frame';
import type { Band, FrameType } from '@/lib/contracts/bands';

/** What a proposal must know of a frame before. */
export interface FormerFrame {
  readonly number: number;
  readonly type: FrameType;
  readonly object: string;
  readonly field: string | null;
  readonly programme: string | null;
  readonly ra: number | null;
  readonly dec: number | null;
  readonly band: Band | null;
  readonly exposure: number;
}

interface UsualExposure {
  readonly band: Band;
  /** s */
  readonly defaultExposure: number | null;
}

/** The band that came after the last one, when it was last used before; frames come the latest first. */
function bandAfter(frames: readonly FormerFrame[]): Band | null {
  const bands = frames.map(({ band }) => band);
  const [last = null] = bands;
  const earlier = bands.indexOf(last, 1);
  return earlier > 0 ? (bands[earlier - 1] ?? null) : last;
}

/** How long a frame of a type and band was exposed last, or usually is; null when nothing is known. */
export function usualExposure(
  frames: readonly FormerFrame[],
  filters: readonly UsualExposure[],
  wanted: Pick<FormerFrame, 'type' | 'object' | 'band'>,
): number | null {
  if (wanted.type === 'bias') return 0;
  const before = frames.find(
    ({ type, object, band }) => type === wanted.type && object === wanted.object && band === wanted.band,
  );
  return before?.exposure ?? filters.find(({ band }) => band === wanted.band)?.defaultExposure ?? null;
}

/** What the next frame of a night probably is: the last one again, in the band that follows in the sequence. */
export function proposeFrame(
  /** The latest first. */
  frames: readonly FormerFrame[],
  filters: readonly UsualExposure[],
  highest: number,
): NextFrame {
  const [last] = frames;
  if (last === undefined) {
    const nothing = { object: '', field: null, programme: null, ra: null, dec: null, band: null };
    return { number: highest + 1, type: 'bias', ...nothing, exposure: 0 };
  }
  const { type, object, field, programme, ra, dec } = last;
  const band = bandAfter(frames.filter((frame) => frame.object === object && frame.type === type));
  const exposure = usualExposure(frames, filters, { type, object, band });
  return { number: highest + 1, type, object, field, programme, ra, dec, band, exposure };
}
