import { bands, type Band } from '@/lib/contracts/bands';
import type { BandFrame } from './band-input';
import { type TimeScale, xOf } from './time-scale';

/** Rows of marks: one per band in use, and one for what has no band of the sky. */
export type RowName = Band | 'other';

const tickTypes: ReadonlySet<BandFrame['type']> = new Set(['bias', 'dark', 'flat'] as const);

export function rowOf(frame: BandFrame): RowName {
  return tickTypes.has(frame.type) || frame.band === null ? 'other' : frame.band;
}

/** Rows in use, blue to red, the other frames last. */
export function rowsOf(frames: readonly BandFrame[]): readonly RowName[] {
  const used = new Set(frames.map(rowOf));
  return [...bands, 'other' as const].filter((row) => used.has(row));
}

/** How a frame is drawn: the band's shape, full or hollow; a triangle, a cross, or a tick. */
export type MarkShape = 'full' | 'hollow' | 'focus' | 'test' | 'tick';

export function shapeOf({ type, band }: BandFrame): MarkShape {
  if (tickTypes.has(type)) return 'tick';
  if (type === 'focus' || type === 'test') return type;
  if (band === null) return 'tick';
  return type === 'target' ? 'hollow' : 'full';
}

export interface Mark {
  readonly x: number;
  readonly y: number;
  readonly row: RowName;
  readonly shape: MarkShape;
  readonly frame: BandFrame;
}

/** A mark per frame that lies on the strip. */
export function marksOf(
  frames: readonly BandFrame[],
  scale: TimeScale,
  rowY: ReadonlyMap<RowName, number>,
): readonly Mark[] {
  return frames.flatMap((frame) => {
    if (frame.utc < scale.start || frame.utc > scale.end) return [];
    const row = rowOf(frame);
    const x = Math.round(xOf(scale, frame.utc) * 10) / 10;
    return [{ x, y: rowY.get(row) ?? 0, row, shape: shapeOf(frame), frame }];
  });
}

/** The mark nearest to a place, if one is near enough, px. */
export function markNear(
  marks: readonly Mark[],
  at: { readonly x: number; readonly y: number },
  reach: number,
): Mark | null {
  let best: Mark | null = null;
  let bestDistance = reach;
  for (const mark of marks) {
    const distance = Math.hypot(mark.x - at.x, mark.y - at.y);
    if (distance > bestDistance) continue;
    best = mark;
    bestDistance = distance;
  }
  return best;
}
