import 'server-only';
import type { Solution } from '@/lib/contracts/api/solution';
import type { ApprovalEffect, SolutionPage } from '@/lib/contracts/solution-page';
import { auditOfSubject } from '@/lib/server/data/audit-events';
import { requireSolution } from '@/lib/server/data/solutions';
import { approvalCounts } from '@/lib/server/data/transformations';
import type { Caller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';
import { nightSolutions, solutionComments } from './solutions';

/** So many solutions of a night stand on a page; nobody has needed more. */
const mostSolutions = 1000;

/** All that the page of a solution shows, but its observations. Who may see a solution may see how it came about. */
export async function solutionPage(caller: Caller, id: string): Promise<SolutionPage> {
  const row = await requireSolution(dataScope(caller), id);
  const [{ items: solutions }, { items: comments }, history] = await Promise.all([
    nightSolutions(caller, row.nightPublicId, { limit: mostSolutions }),
    solutionComments(caller, id),
    auditOfSubject('solution', row.publicId),
  ]);
  const solution = solutions.find((each) => each.id === row.publicId);
  if (!solution) throw new Error(`The solution ${id} is not among those of its night.`);
  return {
    solution,
    telescopeName: row.telescopeName,
    solutions,
    comments,
    history,
    effect: await approvalEffect(solution, { nightId: row.nightId, solutions }),
  };
}

async function approvalEffect(
  { state, verdict, outcome }: Solution,
  { nightId, solutions }: { readonly nightId: number; readonly solutions: readonly Solution[] },
): Promise<ApprovalEffect | null> {
  if (outcome !== 'determined' || (state !== 'draft' && state !== 'proposed')) return null;
  const supersedes = solutions.find((each) => each.state === 'approved')?.number ?? null;
  // Nothing is made of a night that is not photometric; the investigators are told.
  const isPhotometric = verdict !== 'not photometric';
  return { ...(await approvalCounts(nightId)), isPhotometric, supersedes };
}
