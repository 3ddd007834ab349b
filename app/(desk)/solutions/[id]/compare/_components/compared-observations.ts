import type { SolutionObservation } from '@/lib/contracts/api/solution';

/** An observation that two solutions treat differently; null where one of them was not given it. */
export interface Difference {
  readonly id: string;
  readonly one: SolutionObservation | null;
  readonly other: SolutionObservation | null;
}

/** Observations that only one of two solutions used, in order of time. */
export function differences(
  ofOne: readonly SolutionObservation[],
  ofOther: readonly SolutionObservation[],
): readonly Difference[] {
  const others = new Map(ofOther.map((row) => [row.observation, row]));
  const ids = new Set(ofOne.map(({ observation }) => observation));
  const pairs: Difference[] = [
    ...ofOne.map((one) => ({ id: one.observation, one, other: others.get(one.observation) ?? null })),
    ...ofOther
      .filter(({ observation }) => !ids.has(observation))
      .map((other) => ({ id: other.observation, one: null, other })),
  ];
  const utc = ({ one, other }: Difference) => Date.parse((one ?? other)?.utc_mid ?? '');
  return pairs
    .filter(({ one, other }) => (one?.used ?? false) !== (other?.used ?? false))
    .toSorted((first, second) => utc(first) - utc(second));
}
