import type { Site } from '@/lib/astro/site';
import type { Band, FrameType } from '@/lib/contracts/bands';
import type { ColumnMapping } from '@/lib/contracts/measurement-columns';
import type { CheckResult, Slice } from '@/lib/contracts/measurement-check';
import type { MeasurementKind } from '@/lib/contracts/measurement-kinds';
import type { StandardTable } from '@/lib/photometry/match-standards';

/** A frame of the night's log, as far as checking a table needs it. */
export interface LoggedFrame {
  readonly id: number;
  readonly number: number;
  readonly file: string | null;
  readonly type: FrameType;
  readonly band: Band | null;
  readonly exposure_s: number;
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly utcStart: number;
}

/** Everything that the thread works from: it can reach neither the database nor the clock. */
export interface CheckOrder {
  /** The original, and an empty folder for what is to be loaded. */
  readonly original: string;
  readonly folder: string;
  readonly kind: MeasurementKind;
  /** [arcsec] */
  readonly tolerance: number;
  /** As the uploader gave it; where empty, that remembered for the same headers counts. */
  readonly mapping: ColumnMapping;
  readonly remembered: readonly RememberedMapping[];
  readonly frames: readonly LoggedFrame[];
  readonly standards: StandardTable & { readonly ids: Int32Array; readonly fields: readonly string[] };
  readonly night: NightBounds;
  readonly site: Site;
  /** Name of the set, for frames that show nothing with a name. */
  readonly name: string;
  readonly targets: readonly Target[];
}

/** A programme's target that the uploader's frames could show. */
export interface Target {
  readonly programmeId: number;
  readonly name: string;
  /** J2000 [deg] */
  readonly ra: number;
  readonly dec: number;
}

export interface RememberedMapping {
  readonly headers: readonly string[];
  readonly mapping: ColumnMapping;
}

export interface NightBounds {
  /** Noon to noon. [ms since 1970-01-01T00:00:00Z] */
  readonly startsAt: number;
  readonly endsAt: number;
  /** Only an open night takes new frames. */
  readonly isOpen: boolean;
  /** Julian years since 2000.0 */
  readonly epoch_years: number;
  /** Bands that the telescope has filters for. */
  readonly bands: readonly Band[];
  readonly telescope: string;
}

export type CheckMessage =
  | { readonly kind: 'reading'; readonly bytes: number; readonly size: number; readonly rows: number }
  | { readonly kind: 'slice'; readonly slice: Slice }
  | { readonly kind: 'matching'; readonly rows: number }
  | { readonly kind: 'end'; readonly result: CheckResult };
