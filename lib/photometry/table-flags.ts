/**
 * Words in the flag column of measurement tables that have a meaning here. Any other word is kept with the measurement
 * and changes nothing.
 */
export const tableFlagWords = {
  saturated: ['saturated', 'saturation', 'sat', 'nonlinear'],
  leftOut: ['bad', 'reject', 'rejected', 'exclude', 'excluded'],
} as const;

export interface TableFlag {
  readonly isSaturated: boolean;
  /** Whoever measured it says that it must not be used. */
  readonly isLeftOut: boolean;
}

/** What a flag of a measurement table says.
 * @param text - of the flag column: words of letters, in any case, parted by anything else
 * @returns whether it names saturation, and whether the measurement is to be left out
 * @source definition of this program */
export function readTableFlag(text: string): TableFlag {
  const words = text.toLowerCase().split(/[^\p{L}]+/u);
  const names = (meant: readonly string[]): boolean => words.some((word) => meant.includes(word));
  return { isSaturated: names(tableFlagWords.saturated), isLeftOut: names(tableFlagWords.leftOut) };
}
