import 'server-only';
import type { AddComment, SolutionComment } from '@/lib/contracts/api/solution';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { commentsOf, insertComment } from '@/lib/server/data/solution-writes';
import { requireSolution, solutionSubject } from '@/lib/server/data/solutions';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/** Says something about a solution, for those who decide on it. */
export async function addSolutionComment(
  caller: PersonCaller,
  id: string,
  { text }: AddComment,
): Promise<SolutionComment> {
  const solution = await requireSolution(dataScope(caller), id);
  demand(caller, 'solution.comment', await solutionSubject(solution.nightId));
  return inTransaction(async (tx) => {
    await insertComment(tx, { solutionId: solution.id, personId: caller.personId, act: 'comment', text });
    await recordAudit(tx, caller, {
      act: 'solution.comment',
      subjectKind: 'solution',
      subjectId: solution.publicId,
      nightId: solution.nightId,
      after: { comment: text },
    });
    const comment = (await commentsOf(solution.id, tx)).at(-1);
    if (!comment) throw new Error('A comment that was just written is not there.');
    return { act: comment.act, text: comment.text, by: comment.by, at: comment.createdAt.toISOString() };
  });
}
