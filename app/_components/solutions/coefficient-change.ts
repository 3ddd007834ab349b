import type { Solution, SolutionCoefficient } from '@/lib/contracts/api/solution';

/** The solution that a change is counted from: the one it was made from, else the one solved before it. */
export function solutionBefore(solution: Solution, solutions: readonly Solution[]): Solution | null {
  const solved = solutions.filter((one) => one.id !== solution.id && one.outcome !== null);
  return (
    solved.find(({ id }) => id === solution.follows) ??
    solved
      .filter(({ number }) => number < solution.number)
      .toSorted((one, other) => other.number - one.number)[0] ??
    null
  );
}

/** Change of a coefficient from an earlier value, in its own standard errors; null where it cannot be told. */
export function changeInErrors(
  now: SolutionCoefficient,
  before: SolutionCoefficient | undefined,
): number | null {
  if (before === undefined || now.value === null || before.value === null) return null;
  return now.error === null || now.error <= 0 ? null : (now.value - before.value) / now.error;
}
