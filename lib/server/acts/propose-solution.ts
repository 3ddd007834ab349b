import 'server-only';
import type { ProposeSolution, Verdict } from '@/lib/contracts/api/solution';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { photometrists } from '@/lib/server/data/check-notices';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { lockNight } from '@/lib/server/data/night-state';
import { lockSetsOf, takeIntoUse } from '@/lib/server/data/solution-sets';
import { moveSolution } from '@/lib/server/data/solution-state';
import { insertComment } from '@/lib/server/data/solution-writes';
import { nightOf, requireSolution, solutionSubject, type SolutionRow } from '@/lib/server/data/solutions';
import { nightWords, solutionLink } from '@/lib/server/mail/measurement-words';
import { postMail } from '@/lib/server/mail/post-mail';
import { solutionProposedMail } from '@/lib/server/mail/solution-proposed';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/** Proposes a solved draft of a closed night for approval, with a verdict on the night. */
export async function proposeSolution(
  caller: PersonCaller,
  id: string,
  input: ProposeSolution,
): Promise<void> {
  const solution = await requireSolution(dataScope(caller), id);
  demand(caller, 'solution.propose', await solutionSubject(solution.nightId));
  await inTransaction(async (tx) => {
    const night = await lockNight(tx, nightOf(solution));
    const verdict = input.verdict ?? solution.suggestedVerdict;
    const before = await moveSolution(tx, solution, {
      from: ['draft'],
      to: 'proposed',
      version: input.version,
      set: { verdict, proposed_by_id: caller.personId, proposed_at: new Date() },
    });
    demandSolved(solution, before.outcome);
    if (night.state === 'open') {
      throw new Fault(
        'conflict',
        `The night of ${solution.nightDate} is open: its log can still change. Close it first.`,
      );
    }
    if (verdict === null) {
      throw new Fault('invalid-input', 'The fit suggests no verdict, so you must give one.', {
        issues: [{ path: 'verdict', message: 'is missing' }],
      });
    }
    await takeSets(tx, solution);
    await insertComment(tx, {
      solutionId: solution.id,
      personId: caller.personId,
      act: 'propose',
      text: input.comment,
    });
    await recordAudit(tx, caller, {
      act: 'solution.propose',
      subjectKind: 'solution',
      subjectId: solution.publicId,
      nightId: solution.nightId,
      reason: input.comment,
      before: { state: before.state },
      after: { state: 'proposed', verdict, suggested_verdict: solution.suggestedVerdict },
    });
    await tellPhotometrists(tx, caller, solution, { verdict, comment: input.comment });
  });
}

/** Only what was determined can become a night's calibration. */
function demandSolved({ number }: SolutionRow, outcome: SolutionRow['outcome']): void {
  if (outcome === 'determined') return;
  throw new Fault(
    'conflict',
    outcome === null
      ? `Solution ${number} has not been solved yet.`
      : `Solution ${number} is undetermined: what the fit could not find cannot be proposed.`,
  );
}

/** From the proposal on the sets stand: what is judged must still be there when it is approved. */
async function takeSets(tx: Tx, solution: SolutionRow): Promise<void> {
  const sets = await lockSetsOf(tx, solution.id);
  const gone = sets.find(({ state }) => state !== 'matched' && state !== 'in use');
  if (gone) {
    throw new Fault(
      'conflict',
      `The measurement set “${gone.name}”, which solution ${solution.number} used, was taken back. Solve the night again.`,
    );
  }
  await takeIntoUse(tx, sets);
}

/** The others can approve it. */
async function tellPhotometrists(
  tx: Tx,
  caller: PersonCaller,
  solution: SolutionRow,
  proposal: { readonly verdict: Verdict; readonly comment: string },
): Promise<void> {
  for (const person of await photometrists(tx)) {
    if (person.personId === caller.personId) continue;
    const mail = solutionProposedMail({
      name: person.name,
      night: nightWords(solution),
      number: solution.number,
      proposedBy: caller.name,
      ...proposal,
      nUsed: solution.nUsed,
      nObservations: solution.nObservations,
      href: solutionLink(solution),
    });
    await postMail(tx, {
      ...mail,
      dedupeKey: `solution-proposed:${solution.publicId}:${person.personId}`,
      to: person,
    });
  }
}
