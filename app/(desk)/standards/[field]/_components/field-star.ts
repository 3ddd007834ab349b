import type { StandardStar } from '@/lib/contracts/standard-star';

/** A standard star as the page of its field shows it. */
export interface FieldStar extends StandardStar {
  /** From the middle of the chart [deg]. */
  readonly east: number;
  readonly north: number;
}
