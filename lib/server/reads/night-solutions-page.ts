import 'server-only';
import type { JoinableNight, NightSolutionsPage } from '@/lib/contracts/solution-page';
import { joinableNights } from '@/lib/server/data/joinable-nights';
import { requireNight, subjectOf, visibleNightIds, type NightRow } from '@/lib/server/data/nights';
import { epochAt, tallyStandards } from '@/lib/server/data/solve-inputs';
import type { Caller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';
import { dataScope, nightScope } from '@/lib/server/policy/scope';
import { nightSolutions } from './solutions';

/** All that a night's page of solutions shows. */
export async function nightSolutionsPage(caller: Caller, nightId: string): Promise<NightSolutionsPage> {
  const night = await requireNight(nightScope(caller), nightId);
  const maySolve = may(caller, 'solution.solve', subjectOf(night));
  const isVisible = (await visibleNightIds(dataScope(caller), [night.id])).has(night.id);
  if (!isVisible) return { solutions: null, maySolve, bands: [], nights: [] };
  const [{ items: solutions }, tally, nights] = await Promise.all([
    nightSolutions(caller, nightId, { limit: 1000 }),
    tallyStandards([night.id]),
    maySolve ? joinable(caller, night) : [],
  ]);
  return { solutions, maySolve, bands: tally.map(({ nightId: _, ...band }) => band), nights };
}

async function joinable(caller: Caller, night: NightRow): Promise<readonly JoinableNight[]> {
  const epoch = await epochAt(night.telescopeId, night.date);
  const nights = await joinableNights(dataScope(caller), { night, epoch });
  return nights.map(({ publicId, date, nObservations }) => ({ id: publicId, date, nObservations }));
}
