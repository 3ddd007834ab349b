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

/** Holds when a number agrees with the expected one in so many digits: −log10 of the relative error, or of the error
 * itself where zero is expected. */
export function expectDigits(actual: number, expected: number, digits: number): void {
  const error = Math.abs(actual - expected) / (expected === 0 ? 1 : Math.abs(expected));
  const found = error === 0 ? Infinity : -Math.log10(error);
  // A comparison that NaN fails.
  expect(found >= digits, `${actual} agrees with ${expected} in ${found} digits; asked are ${digits}`).toBe(
    true,
  );
}
