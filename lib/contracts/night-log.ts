import type { Condition } from './api/condition';
import type { Frame } from './api/frame';
import type { Night } from './api/night';
import type { Remark } from './api/remark';
import type { TimeLoss } from './api/time-loss';
import type { Band } from './bands';

export interface LogFilter {
  readonly band: Band;
  readonly name: string;
  /** s */
  readonly defaultExposure: number | null;
}

/** A night with all that is logged of it, as its pages hold it. */
export interface NightLog {
  readonly night: Night;
  readonly telescope: {
    readonly code: string;
    readonly name: string;
    readonly filters: readonly LogFilter[];
  };
  readonly site: {
    readonly name: string;
    /** deg, east positive */
    readonly longitude: number;
    /** deg */
    readonly latitude: number;
    /** m */
    readonly elevation: number;
    readonly timezone: string;
  };
  /** By mid-exposure. */
  readonly frames: readonly Frame[];
  readonly conditions: readonly Condition[];
  readonly remarks: readonly Remark[];
  readonly timeLosses: readonly TimeLoss[];
  /** Measurement sets; null where they are not the reader's to see. */
  readonly sets: number | null;
  readonly may: {
    readonly log: boolean;
    readonly close: boolean;
    readonly reopen: boolean;
    readonly upload: boolean;
  };
}
