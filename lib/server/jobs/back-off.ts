import 'server-only';

const first_s = 5;

/**
 * Seconds to wait before the next try: 5, 10, 20, …, at most `longest_s`, each spread by a fifth to either side so that
 * jobs which failed together do not come back together.
 */
export function backOff_s(attempt: number, longest_s: number, chance: () => number = Math.random): number {
  const wait = Math.min(first_s * 2 ** Math.min(attempt - 1, 30), longest_s);
  return wait * (0.8 + 0.4 * chance());
}
