import 'server-only';
import type { WithdrawSolution } from '@/lib/contracts/api/solution';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { lockNight, moveNight } from '@/lib/server/data/night-state';
import { releaseSets } from '@/lib/server/data/solution-sets';
import { moveSolution } from '@/lib/server/data/solution-state';
import { insertComment } from '@/lib/server/data/solution-writes';
import { nightOf, requireSolution, solutionSubject, type SolutionRow } from '@/lib/server/data/solutions';
import { withdrawTransformations } from '@/lib/server/data/transformations';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/**
 * Withdraws a solution from any state, for a reason. Of an approved one its magnitudes go with it and the night is closed
 * again. The solution that it had superseded stays superseded: what was replaced does not come back by itself.
 */
export async function withdrawSolution(
  caller: PersonCaller,
  id: string,
  input: WithdrawSolution,
): Promise<void> {
  const solution = await requireSolution(dataScope(caller), id);
  demand(caller, 'solution.withdraw', await solutionSubject(solution.nightId));
  await inTransaction(async (tx) => {
    const night = await lockNight(tx, nightOf(solution));
    const before = await moveSolution(tx, solution, {
      from: ['draft', 'proposed', 'approved', 'superseded'],
      to: 'withdrawn',
      version: input.version,
      set: { withdrawn_by_id: caller.personId, withdrawn_at: new Date() },
    });
    const transformations = await withdrawTransformations(tx, solution.id);
    await releaseSets(tx, solution.id);
    await insertComment(tx, {
      solutionId: solution.id,
      personId: caller.personId,
      act: 'withdraw',
      text: input.comment,
    });
    if (before.state === 'approved' && night.state === 'calibrated')
      await uncalibrateNight(tx, caller, solution);
    await recordAudit(tx, caller, {
      act: 'solution.withdraw',
      subjectKind: 'solution',
      subjectId: solution.publicId,
      nightId: solution.nightId,
      reason: input.comment,
      before: { state: before.state },
      after: {
        state: 'withdrawn',
        transformations_withdrawn: transformations,
        // Said for whoever expects the earlier solution back.
        ...(before.state === 'approved' ? { reinstated: null } : {}),
      },
    });
  });
}

async function uncalibrateNight(tx: Tx, caller: PersonCaller, solution: SolutionRow): Promise<void> {
  const night = nightOf(solution);
  await moveNight(tx, night, { from: ['calibrated'], to: 'closed' });
  await recordAudit(tx, caller, {
    act: 'night.uncalibrate',
    subjectKind: 'night',
    subjectId: night.publicId,
    nightId: night.id,
    before: { state: 'calibrated' },
    after: { state: 'closed', withdrawn: solution.publicId },
  });
}
