import 'server-only';
import type { SolutionFinding } from '@/lib/contracts/api/solution';
import type { SolveSet, StandardColumns } from '@/lib/server/data/solve-inputs';

export interface OnlyLatest {
  readonly rows: StandardColumns;
  readonly findings: readonly SolutionFinding[];
}

/**
 * Of a star that two sets measured on one frame, the row of the later set: the same light counted twice would make errors
 * too small. Rows that one set has twice stay, they are two measurements. Sets come in the order of their upload, and rows
 * set by set.
 */
export function onlyLatest(all: StandardColumns, sets: readonly SolveSet[]): OnlyLatest {
  const latest = new Map<string, number>();
  const keys = all.frameId.map((frame, row) => `${frame} ${all.standardId[row]}`);
  for (const [row, key] of keys.entries()) latest.set(key, all.setId[row] ?? 0);
  const superseded = new Map<number, number>();
  const kept: number[] = [];
  for (const [row, key] of keys.entries()) {
    const set = all.setId[row] ?? 0;
    if (latest.get(key) === set) kept.push(row);
    else superseded.set(set, (superseded.get(set) ?? 0) + 1);
  }
  const pick = (column: readonly number[]): number[] => kept.map((row) => column[row] ?? NaN);
  const names = new Map(sets.map(({ id, name }) => [id, name]));
  return {
    rows: {
      setId: pick(all.setId),
      rowNo: pick(all.rowNo),
      frameId: pick(all.frameId),
      standardId: pick(all.standardId),
      instMag: pick(all.instMag),
      instErr: pick(all.instErr),
    },
    findings: [...superseded].map(([set, n]) => ({
      weight: 'caution',
      kind: 'measured-again',
      band: null,
      night_date: null,
      coefficient: null,
      reason: `${n} measurements of the set “${names.get(set) ?? ''}” stand in a later set too: the later ones count.`,
      remedy: 'Take the set back that should not count, and solve again.',
    })),
  };
}
