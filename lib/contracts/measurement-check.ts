import type { Issue } from '@/lib/faults/fault';
import type { Band, FrameType } from './bands';
import type { ColumnMapping } from './measurement-columns';

/** A frame that the log does not have and the table tells enough of, ready to be written. */
export interface NewFrame {
  /** Null where the table names it by its file: the log gives the next free number. */
  readonly number: number | null;
  readonly file: string | null;
  readonly type: FrameType;
  readonly band: Band;
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly utcStart: number;
  readonly exposure_s: number;
  readonly place: {
    readonly object: string;
    /** Field of the standards that were found on it. */
    readonly field: string | null;
    /** Internal id of the programme whose target it shows. */
    readonly programmeId: number | null;
    /** Middle of its stars, J2000; null where table and standards give no position. [deg] */
    readonly ra: number | null;
    readonly decl: number | null;
  };
  readonly geometry: {
    readonly utcMid: number;
    readonly airmass: number | null;
    readonly altitude: number | null;
    readonly hourAngle: number | null;
    readonly moonSeparation: number | null;
    readonly sunAltitude: number;
  };
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

/** A tab-separated file in the order of a table's columns; see lib/server/data/measurement-loads.ts. */
export interface Slice {
  readonly file: string;
  readonly rows: number;
}

/** What is to be loaded when a table has no fault, beside the slices of rows that were handed over before. */
export interface LoadPlan {
  /** Slices with rows on frames that are yet to be created: −1 stands for the first of these, −2 for the second, … */
  readonly slices: readonly Slice[];
  readonly stars: readonly Slice[];
  readonly flags: readonly Slice[];
  readonly matchedRows: number;
  readonly newFrames: readonly NewFrame[];
  /** The frames that the rows name: ids of the log, or −1, −2, … as above, with their numbers of rows. */
  readonly usedFrames: readonly { readonly frame: number; readonly rows: number }[];
}
