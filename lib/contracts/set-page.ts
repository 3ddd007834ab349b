import type { MeasuredStar, MeasurementFault, MeasurementRow, MeasurementSet } from './api/measurement-set';
import type { Band } from './bands';
import type { List } from './common';

/** What of a measurement set its page shows: stars that are standards, the others, rows, or faults. */
export const setParts = ['matched', 'others', 'rows', 'faults'] as const;
export type SetPart = (typeof setParts)[number];

export type SetPartContents =
  | { readonly part: 'matched' | 'others'; readonly list: List<MeasuredStar>; readonly reason: string | null }
  | { readonly part: 'rows'; readonly list: List<MeasurementRow> }
  | { readonly part: 'faults'; readonly list: List<MeasurementFault> };

/** Stars that were matched in one way, or not for one reason. */
export interface StarTally {
  readonly matchedBy: 'name' | 'position' | null;
  /** Empty for stars that are standards. */
  readonly reason: string;
  readonly nStars: number;
  readonly nRows: number;
  readonly nCautions: number;
}

export interface MeasurementSummary {
  readonly frames: readonly { readonly number: number; readonly band: Band | null; readonly nRows: number }[];
  readonly tally: readonly StarTally[];
}

export interface SetPage {
  readonly set: MeasurementSet;
  readonly telescopeName: string;
  readonly summary: MeasurementSummary;
  /** Null while there is nothing in the set, or nothing for this caller. */
  readonly contents: SetPartContents | null;
  /** Cursor of the page before this one; null for the first. */
  readonly after: string | null;
}
