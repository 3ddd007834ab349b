import 'server-only';
import type { Waiting } from '@/lib/contracts/waiting';
import * as data from '@/lib/server/data/waiting';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';
import { dataScope, nightScope, ownScope } from '@/lib/server/policy/scope';

const nothing = { n: 0, first: [] } as const;

/** What waits for the caller, by what they may do: each part is asked only of who can do something about it. */
export async function waiting(caller: PersonCaller): Promise<Waiting> {
  const { personId } = caller;
  const scope = dataScope(caller);
  const can = {
    observe: caller.roles.has('observer'),
    propose: may(caller, 'solution.propose'),
    decide: may(caller, 'solution.approve'),
    investigate: caller.programmes.size > 0,
    managePeople: may(caller, 'people.manage'),
    retryJobs: may(caller, 'job.retry'),
  };
  const [openNights, refusedSets, unsolvedNights, ownDrafts, toDecide, newResults, invited, nFailedJobs] =
    await Promise.all([
      can.observe ? data.openNightsOf(nightScope(caller), personId) : nothing,
      data.refusedSetsOf(scope, personId),
      can.propose ? data.unsolvedNights(scope) : nothing,
      data.draftsOf(scope, personId),
      can.decide ? data.proposalsFor(scope, personId) : nothing,
      can.investigate ? data.unseenResults(scope, personId) : nothing,
      can.managePeople ? data.invitedPeople() : nothing,
      can.retryJobs ? data.countFailedJobs(ownScope(caller)) : 0,
    ]);
  return { openNights, refusedSets, unsolvedNights, ownDrafts, toDecide, newResults, invited, nFailedJobs };
}
