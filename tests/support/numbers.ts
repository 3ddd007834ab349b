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

/**
 * Holds when a number agrees with a certified one to so many significant digits: −log10 of the relative difference,
 * or of the absolute one where the certified number is zero.
 */
export function expectDigits(actual: number, certified: number, digits: number): void {
  const scale = certified === 0 ? 1 : Math.abs(certified);
  const agreed = actual === certified ? Infinity : -Math.log10(Math.abs(actual - certified) / scale);
  expect(
    agreed >= digits,
    `${actual} agrees with ${certified} to ${agreed.toFixed(2)} digits; wanted are ${digits}`,
  ).toBe(true);
}
