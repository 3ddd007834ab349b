import type { Solution, SolutionComment } from './api/solution';
import type { AuditRow } from './audit';
import type { Band } from './bands';

/** What an approval would set off, counted as things stand now. */
export interface ApprovalEffect {
  /** False: the verdict says that it is not, so nothing is transformed. */
  readonly isPhotometric: boolean;
  /** Measurements of targets. */
  readonly nMagnitudes: number;
  readonly nProgrammes: number;
  /** People who get a mail. */
  readonly nInvestigators: number;
  /** Number of the approved solution that it would take the place of; null where there is none. */
  readonly supersedes: number | null;
}

/** All that the page of a solution shows, but its observations: those the page asks for itself. */
export interface SolutionPage {
  readonly solution: Solution;
  readonly telescopeName: string;
  /** All of the night, the newest first, itself among them. */
  readonly solutions: readonly Solution[];
  /** The oldest first. */
  readonly comments: readonly SolutionComment[];
  /** What the audit trail has about it, the latest first. */
  readonly history: readonly AuditRow[];
  /** Null where there is nothing to approve, or no longer. */
  readonly effect: ApprovalEffect | null;
}

/** A band in which the night has standards. */
export interface SolvableBand {
  readonly band: Band;
  readonly nObservations: number;
  readonly nStars: number;
  readonly nFrames: number;
}

/** A further night that can be solved jointly: of the same telescope and equipment epoch, with matched standards. */
export interface JoinableNight {
  readonly id: string;
  readonly date: string;
  readonly nObservations: number;
}

/** All that a night's page of solutions shows. */
export interface NightSolutionsPage {
  /** The newest first; null where the night's solutions are not the caller's to see, though its log is. */
  readonly solutions: readonly Solution[] | null;
  /** Whether the caller may start a solve, whatever the night lacks. */
  readonly maySolve: boolean;
  /** Empty while no standard has been matched. */
  readonly bands: readonly SolvableBand[];
  /** The nearest in time first. */
  readonly nights: readonly JoinableNight[];
}
