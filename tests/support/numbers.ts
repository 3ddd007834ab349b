import { expect } from 'vitest';

export interface Tolerance {
  /** Largest difference, in the unit named. */
  readonly absolute: number;
  readonly unit: string;
}

/** Holds when a number lies within a named tolerance of the expected one; says by how much it does not. */
export function expectWithin(actual: number, expected: number, { absolute, unit }: Tolerance): void {
  const difference = Math.abs(actual - expected);
  // A comparison that NaN fails.
  expect(
    difference <= absolute,
    `${actual} is ${difference} ${unit} from ${expected}; allowed are ${absolute} ${unit}`,
  ).toBe(true);
}
