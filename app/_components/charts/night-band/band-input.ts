import type { Band, FrameType } from '@/lib/contracts/bands';
import type { NightSky } from './night-sky';

/** A frame as the band draws it. */
export interface BandFrame {
  readonly number: number;
  readonly type: FrameType;
  readonly band: Band | null;
  readonly object: string;
  /** Mid-exposure, ms. */
  readonly utc: number;
}

export interface BandCondition {
  /** ms */
  readonly utc: number;
  /** Eighths. */
  readonly cloud: number | null;
}

export interface BandInput {
  readonly sky: NightSky;
  readonly frames: readonly BandFrame[];
  readonly conditions: readonly BandCondition[];
  /** Of the strip itself, px. */
  readonly width: number;
  /** ms; null in nights gone by. */
  readonly now: number | null;
}
