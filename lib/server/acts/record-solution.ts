import 'server-only';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { insertBand, type StoredBand } from '@/lib/server/data/solution-bands';
import {
  insertSolvedFrom,
  loadObservations,
  settleDraft,
  type SolvedColumns,
} from '@/lib/server/data/solution-records';
import { lockSolution } from '@/lib/server/data/solution-state';
import { requireSolution } from '@/lib/server/data/solutions';
import { demandLease } from '@/lib/server/jobs/lease';
import type { JobResult } from '@/lib/server/jobs/kinds';
import type { JobCaller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';

export interface SolvedNight extends SolvedColumns {
  readonly bands: readonly StoredBand[];
  readonly nights: readonly { readonly id: number; readonly utcZero: Date | null }[];
  /** Sets that gave observations, internal ids. */
  readonly setIds: readonly number[];
  /** Files with a line for every observation. */
  readonly slices: readonly { readonly file: string; readonly rows: number }[];
}

/**
 * Stores what a fit found: all of it or nothing. Run again after a crash the first run's word stands, and a draft that
 * was withdrawn meanwhile takes nothing.
 */
export async function recordSolution(
  caller: JobCaller,
  id: string,
  solved: SolvedNight,
): Promise<JobResult<'solve-night'>> {
  return inTransaction(async (tx) => {
    const scope = dataScope(caller);
    await lockSolution(tx, await requireSolution(scope, id, tx));
    // Read again under the lock: another run may have been first.
    const solution = await requireSolution(scope, id, tx);
    if (solution.outcome !== null) {
      const { outcome, nObservations, nUsed } = solution;
      return { solution: id, outcome, observations: nObservations, used: nUsed };
    }
    if (solution.state !== 'draft')
      return { solution: id, outcome: 'withdrawn' as const, observations: 0, used: 0 };
    const { nObservations: observations, nUsed: used } = solved;
    await loadObservations(tx, solution.id, solved.slices);
    for (const band of solved.bands) await insertBand(tx, solution.id, band);
    await insertSolvedFrom(tx, solution.id, solved);
    if (!(await settleDraft(tx, solution.id, solved)))
      throw new Error(`The draft ${id} changed while it was locked.`);
    await recordAudit(tx, caller, {
      act: 'solution.solve',
      subjectKind: 'solution',
      subjectId: solution.publicId,
      nightId: solution.nightId,
      after: {
        outcome: solved.outcome,
        suggested_verdict: solved.suggestedVerdict,
        observations,
        used,
        input_hash: solved.inputHash,
      },
    });
    await demandLease(tx, caller);
    return { solution: id, outcome: solved.outcome, observations, used };
  });
}
