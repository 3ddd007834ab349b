import 'server-only';
import type { MeasurementSet } from '@/lib/contracts/api/measurement-set';
import type { List, Page } from '@/lib/contracts/common';
import { checkJobs } from '@/lib/server/data/measurement-jobs';
import {
  listSetRows,
  observersOfNight,
  programmesInNight,
  requireSet,
  type MeasurementSetRow,
} from '@/lib/server/data/measurement-sets';
import { requireNight } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';
import { seesWhole, shownSet } from './measurement-set-shown';

/** The sets of a night that the caller may see, the newest first. */
export async function nightMeasurements(
  caller: Caller,
  nightId: string,
  page: Page,
): Promise<List<MeasurementSet>> {
  const scope = dataScope(caller);
  const night = await requireNight(scope, nightId);
  const [{ rows, next }, jobs, observerIds, programmeIds] = await Promise.all([
    listSetRows(scope, night.id, page),
    checkJobs(night.id),
    observersOfNight(night.id),
    programmesInNight(night.id),
  ]);
  const items = rows.map((set) =>
    shownSet(caller, set, { job: jobs.get(set.publicId), observerIds, programmeIds }),
  );
  return { items, next };
}

/** One set that the caller may see. */
export async function measurementSet(caller: Caller, id: string): Promise<MeasurementSet> {
  const set = await requireSet(dataScope(caller), id);
  const [jobs, observerIds, programmeIds] = await Promise.all([
    checkJobs(set.nightId),
    observersOfNight(set.nightId),
    programmesInNight(set.nightId),
  ]);
  return shownSet(caller, set, { job: jobs.get(set.publicId), observerIds, programmeIds });
}

/** The set, and whether the caller may see all of it. */
export async function visibleSet(
  caller: Caller,
  id: string,
): Promise<{ readonly set: MeasurementSetRow; readonly isWhole: boolean }> {
  const set = await requireSet(dataScope(caller), id);
  return { set, isWhole: seesWhole(caller, set, await observersOfNight(set.nightId)) };
}
