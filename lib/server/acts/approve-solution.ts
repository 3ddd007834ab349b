import 'server-only';
import type { ApproveSolution } from '@/lib/contracts/api/solution';
import { readSettings } from '@/lib/contracts/settings';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { lockNight, moveNight } from '@/lib/server/data/night-state';
import { observatory } from '@/lib/server/data/observatory';
import { addTargetSets, lockSetsOf, takeIntoUse } from '@/lib/server/data/solution-sets';
import { approvedBeside, moveSolution } from '@/lib/server/data/solution-state';
import { commentsOf, insertComment } from '@/lib/server/data/solution-writes';
import { nightOf, requireSolution, solutionSubject, type SolutionRow } from '@/lib/server/data/solutions';
import {
  dropQueuedTransformations,
  queueTransformations,
  targetInvestigators,
} from '@/lib/server/data/transformations';
import { enqueue } from '@/lib/server/jobs/enqueue';
import { transformJob } from '@/lib/server/jobs/transform-job';
import { nightWords, solutionLink } from '@/lib/server/mail/measurement-words';
import { nightNotPhotometricMail } from '@/lib/server/mail/night-not-photometric';
import { postMail } from '@/lib/server/mail/post-mail';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';
import { environment } from '@/lib/server/settings/environment';

/**
 * Approves a proposed solution: the one before it is superseded, the night is calibrated, and its targets are to be
 * transformed, all in one transaction that holds the night. It calibrates its own night only: nights that were solved
 * with it lent their standards, and the verdict on each is a person's of its own.
 */
export async function approveSolution(
  caller: PersonCaller,
  id: string,
  input: ApproveSolution,
): Promise<void> {
  const seen = await requireSolution(dataScope(caller), id);
  demand(caller, 'solution.approve', await solutionSubject(seen.nightId));
  await inTransaction(async (tx) => {
    await lockNight(tx, nightOf(seen));
    // Read again under the lock: the verdict may have been given a moment ago, and what is made follows from it.
    const solution = await requireSolution(dataScope(caller), id, tx);
    const before = await moveSolution(tx, solution, {
      from: ['proposed'],
      to: 'approved',
      version: input.version,
      set: { approved_by_id: caller.personId, approved_at: new Date() },
    });
    const isOwn = before.proposedById === caller.personId;
    if (isOwn) await demandSingleApprover(tx);
    const superseded = await supersedeOthers(tx, caller, solution);
    await calibrateNight(tx, caller, solution);
    const programmes = await queueTargets(tx, caller, solution);
    await insertComment(tx, {
      solutionId: solution.id,
      personId: caller.personId,
      act: 'approve',
      text: input.comment,
    });
    if (solution.verdict === 'not photometric') await tellInvestigators(tx, caller, solution);
    await recordAudit(tx, caller, {
      act: 'solution.approve',
      subjectKind: 'solution',
      subjectId: solution.publicId,
      nightId: solution.nightId,
      reason: input.comment,
      before: { state: before.state },
      after: {
        state: 'approved',
        verdict: solution.verdict,
        supersedes: superseded,
        transformations: programmes,
        ...(isOwn ? { approved_by_proposer: true, second_approver_required: false } : {}),
      },
    });
  });
}

/** Two people judge a calibration, unless the observatory has switched that off. */
async function demandSingleApprover(tx: Tx): Promise<void> {
  const house = await observatory(tx);
  if (!readSettings(house?.settings).secondApprover) return;
  throw new Fault(
    'not-allowed',
    'You proposed this solution, so another photometrist must approve it. The observatory’s settings say so.',
  );
}

async function supersedeOthers(
  tx: Tx,
  caller: PersonCaller,
  solution: SolutionRow,
): Promise<readonly string[]> {
  const others = await approvedBeside(tx, solution.nightId, solution.id);
  for (const other of others) {
    await moveSolution(tx, other, {
      from: ['approved'],
      to: 'superseded',
      set: { superseded_by_id: solution.id },
    });
    const dropped = await dropQueuedTransformations(tx, other.id);
    await recordAudit(tx, caller, {
      act: 'solution.supersede',
      subjectKind: 'solution',
      subjectId: other.publicId,
      nightId: solution.nightId,
      before: { state: 'approved' },
      after: { state: 'superseded', by: solution.publicId, transformations_dropped: dropped },
    });
  }
  return others.map(({ publicId }) => publicId);
}

async function calibrateNight(tx: Tx, caller: PersonCaller, solution: SolutionRow): Promise<void> {
  const night = nightOf(solution);
  const before = await moveNight(tx, night, { from: ['closed', 'calibrated'], to: 'calibrated' });
  await recordAudit(tx, caller, {
    act: 'night.calibrate',
    subjectKind: 'night',
    subjectId: night.publicId,
    nightId: night.id,
    before: { state: before },
    after: { state: 'calibrated', solution: solution.publicId, verdict: solution.verdict },
  });
}

/** Queues what the approval is for. Of a night that is not photometric nothing is made: no magnitude of it would be true. */
async function queueTargets(tx: Tx, caller: PersonCaller, solution: SolutionRow): Promise<number> {
  if (solution.verdict === 'not photometric') return 0;
  await addTargetSets(tx, solution.id, solution.nightId);
  await takeIntoUse(tx, await lockSetsOf(tx, solution.id));
  const programmes = await queueTransformations(tx, solution.id, solution.nightId);
  if (programmes === 0) return 0;
  await enqueue(tx, caller, transformJob(solution));
  return programmes;
}

/** Nothing else would tell the investigators that no magnitudes are to come. Each gets one mail, for all programmes. */
async function tellInvestigators(tx: Tx, caller: PersonCaller, solution: SolutionRow): Promise<void> {
  const comments = await commentsOf(solution.id, tx);
  const saidAt = (act: 'propose' | 'approve'): string =>
    comments.findLast((comment) => comment.act === act)?.text ?? '';
  for (const person of await targetInvestigators(tx, solution.nightId)) {
    const mail = nightNotPhotometricMail({
      name: person.name,
      night: nightWords(solution),
      programmes: person.programmes.split(','),
      solution: solution.number,
      proposedBy: solution.proposedBy ?? '',
      proposal: saidAt('propose'),
      approvedBy: caller.name,
      comment: saidAt('approve'),
      evidence: speakingAgainst(solution),
      hasEarlier: Number(person.hasMagnitudes) === 1,
      href: solutionLink(solution),
      measurements: `${environment().baseUrl}/nights/${solution.nightPublicId}/measurements`,
    });
    await postMail(tx, {
      ...mail,
      dedupeKey: `night-not-photometric:${solution.publicId}:${person.personId}`,
      to: person,
    });
  }
}

/** The words of the evidence against the night; where people judged it more severely, those that ask for care. */
function speakingAgainst({ evidence }: SolutionRow): readonly string[] {
  const wordsThat = (speaks: 'against' | 'care'): readonly string[] =>
    (evidence ?? []).filter((item) => item.speaks === speaks).map(({ words }) => words);
  const against = wordsThat('against');
  return against.length > 0 ? against : wordsThat('care');
}
