import type { Band, FrameType } from '@/lib/contracts/bands';
import type { ColumnMapping } from '@/lib/contracts/measurement-columns';
import type { MeasurementKind } from '@/lib/contracts/measurement-kinds';
import type { Issue } from '@/lib/faults/fault';
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

/** A frame that the log does not have and the table tells enough of. */
export interface NewFrame {
  /** Null where the table names it by its file: the log gives the next free number. */
  readonly number: number | null;
  readonly file: string | null;
  readonly type: FrameType;
  readonly band: Band;
  readonly utcStart: number;
  readonly exposure_s: number;
  /** Middle of its stars, J2000; null where the table and the standards give no position. [deg] */
  readonly ra: number | null;
  readonly dec: number | null;
  /** Field of the standards that were found on it. */
  readonly field: string | null;
}

/** What was found in a table, and what of it is to be loaded. */
export interface CheckResult {
  readonly rows: number;
  readonly comments: string;
  /** Column → header in the file, as applied. */
  readonly columns: ColumnMapping;
  readonly faults: readonly Issue[];
  readonly nFaults: number;
  /** Null when there are faults. */
  readonly load: LoadPlan | null;
}

/** Tab-separated files in the order of the tables' columns; see row-files.ts. */
export interface LoadPlan {
  readonly slices: readonly { readonly file: string; readonly rows: number }[];
  readonly stars: { readonly file: string; readonly rows: number };
  readonly flags: { readonly file: string; readonly rows: number };
  readonly matchedRows: number;
  /** In the rows, a frame that is to be created stands as −1 for the first of these, −2 for the second, … */
  readonly newFrames: readonly NewFrame[];
  /** The frames that the rows name: ids of the log, or −1, −2, … as above, with their numbers of rows. */
  readonly usedFrames: readonly { readonly frame: number; readonly rows: number }[];
}

export type CheckMessage =
  | { readonly kind: 'reading'; readonly bytes: number; readonly size: number; readonly rows: number }
  | { readonly kind: 'matching'; readonly rows: number }
  | { readonly kind: 'end'; readonly result: CheckResult };
