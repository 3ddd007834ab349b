import type { BandCondition, BandFrame } from '@/app/_components/charts/night-band/band-input';
import type { Condition } from '@/lib/contracts/api/condition';
import type { Frame } from '@/lib/contracts/api/frame';

/** Frames as the night band draws them, by time. */
export function bandFrames(frames: readonly Frame[]): readonly BandFrame[] {
  return frames
    .map(({ number, type, band, object, utc_mid }) => ({
      number,
      type,
      band,
      object,
      utc: Date.parse(utc_mid),
    }))
    .toSorted((a, b) => a.utc - b.utc);
}

export function bandConditions(conditions: readonly Condition[]): readonly BandCondition[] {
  return conditions.map(({ utc, cloud }) => ({ utc: Date.parse(utc), cloud }));
}
