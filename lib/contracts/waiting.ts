import type { Solution } from './api/solution';

/** The night that a thing is about. */
export interface WaitingNight {
  readonly night: string;
  readonly date: string;
  readonly telescope: string;
}
export interface WaitingSet extends WaitingNight {
  readonly set: string;
  readonly name: string;
  readonly nFaults: number;
}
export interface WaitingSolution extends WaitingNight {
  readonly solution: string;
  readonly number: number;
  readonly outcome: Solution['outcome'];
  readonly proposedBy: string | null;
}
export interface WaitingResult extends WaitingNight {
  readonly programme: string;
  readonly nStars: number | null;
  readonly verdict: Solution['verdict'];
}
export interface WaitingPerson {
  readonly name: string;
  readonly email: string;
}

/** How many there are, and the first hundred of them. */
export interface Waits<T> {
  readonly n: number;
  readonly first: readonly T[];
}

/** What waits for a person. What is none of their business is empty. */
export interface Waiting {
  /** Nights of theirs as an observer that nobody has closed. */
  readonly openNights: Waits<WaitingNight>;
  /** Uploads that were refused and not made up for since: their own, and those of nights they observed. */
  readonly refusedSets: Waits<WaitingSet>;
  /** Closed nights whose standards were measured and that nobody has solved. */
  readonly unsolvedNights: Waits<WaitingNight>;
  /** Drafts of theirs that nothing has come of yet. */
  readonly ownDrafts: Waits<WaitingSolution>;
  /** Proposals of others. */
  readonly toDecide: Waits<WaitingSolution>;
  /** Calibrated magnitudes of their programmes that they have not opened. */
  readonly newResults: Waits<WaitingResult>;
  /** People who have not taken their invitation. */
  readonly invited: Waits<WaitingPerson>;
  readonly nFailedJobs: number;
}
