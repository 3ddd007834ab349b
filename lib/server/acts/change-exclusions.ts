import 'server-only';
import type { ChangeExclusions, QueuedSolution } from '@/lib/contracts/api/solution';
import { Fault, type Issue } from '@/lib/faults/fault';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { lockNight } from '@/lib/server/data/night-state';
import { observationsOf } from '@/lib/server/data/solution-observations';
import { exclusionsOf, type ExclusionRow } from '@/lib/server/data/solution-writes';
import { nightOf, requireSolution, solutionSubject } from '@/lib/server/data/solutions';
import { nightsOfSolution } from '@/lib/server/data/solve-inputs';
import { queueDraft } from '@/lib/server/jobs/queue-draft';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/** Keeps observations out, or in, and solves again: a new draft with all earlier decisions. The old one stays as it is. */
export async function changeExclusions(
  caller: PersonCaller,
  id: string,
  change: ChangeExclusions,
): Promise<QueuedSolution> {
  const solution = await requireSolution(dataScope(caller), id);
  demand(caller, 'solution.exclude', await solutionSubject(solution.nightId));
  if (solution.outcome === null) {
    throw new Fault(
      'conflict',
      `Solution ${solution.number} has not been solved yet: there is nothing to judge its observations by.`,
    );
  }
  return inTransaction(async (tx) => {
    await lockNight(tx, nightOf(solution));
    const changed = await changedRows(tx, { caller, solutionId: solution.id, change });
    const kept = await exclusionsOf([solution.id], tx);
    const rows = new Map(kept.map((row) => [`${row.setId}.${row.rowNo}`, row as ExclusionRow]));
    for (const row of changed) rows.set(`${row.setId}.${row.rowNo}`, row);
    const nights = await nightsOfSolution(solution.id, tx);
    return queueDraft(tx, caller, {
      night: { id: solution.nightId },
      jointNightIds: nights.map((night) => night.id).filter((night) => night !== solution.nightId),
      model: solution.model,
      inputs: { ...solution.inputs, frameVersions: null },
      exclusions: [...rows.values()],
      follows: solution,
      reason: change.reason,
    });
  });
}

async function changedRows(
  tx: Tx,
  {
    caller,
    solutionId,
    change,
  }: { readonly caller: PersonCaller; readonly solutionId: number; readonly change: ChangeExclusions },
): Promise<readonly ExclusionRow[]> {
  const found = await observationsOf(tx, solutionId, change.observations);
  const issues: Issue[] = [];
  const rows = change.observations.flatMap((observation, place) => {
    const row = found.get(observation);
    if (row)
      return [{ ...row, isExcluded: !change.restore, reason: change.reason, personId: caller.personId }];
    issues.push({
      path: `observations.${place}`,
      value: observation,
      message: 'is no observation of this solution',
    });
    return [];
  });
  if (issues.length > 0)
    throw new Fault('invalid-input', 'Not all of these observations are there.', { issues });
  return rows;
}
