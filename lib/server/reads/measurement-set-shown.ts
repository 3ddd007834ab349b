import 'server-only';
import { hasEnded } from '@/lib/contracts/api/job';
import type { MeasurementSet } from '@/lib/contracts/api/measurement-set';
import type { CheckJobRow } from '@/lib/server/data/measurement-jobs';
import type { MeasurementSetRow } from '@/lib/server/data/measurement-sets';
import type { Caller } from '@/lib/server/policy/caller';
import { may, type Subject } from '@/lib/server/policy/matrix';
import { dataScope } from '@/lib/server/policy/scope';

/**
 * Whether the caller may see all of a set. An investigator may not when it has rows on other programmes' frames, and of
 * a table that was not taken nobody can say whose its rows are: then only who uploaded it may.
 */
export function seesWhole(caller: Caller, set: MeasurementSetRow, observerIds: readonly number[]): boolean {
  const scope = dataScope(caller);
  if (scope.all || set.uploadedById === caller.personId) return true;
  if (scope.observerId !== null && observerIds.includes(scope.observerId)) return true;
  const isTaken = set.state === 'matched' || set.state === 'in use';
  return isTaken && Number(set.hasHiddenFrames) === 0;
}

export interface SetContext {
  readonly job: CheckJobRow | undefined;
  readonly observerIds: readonly number[];
  readonly programmeIds: readonly number[];
}

/** What a right on the set depends on. */
export const setSubject = (set: MeasurementSetRow, context: Omit<SetContext, 'job'>): Subject => ({
  observerIds: context.observerIds,
  programmeIds: context.programmeIds,
  ownerId: set.uploadedById,
});

/** A set as this caller sees it. */
export function shownSet(caller: Caller, set: MeasurementSetRow, context: SetContext): MeasurementSet {
  const isWhole = seesWhole(caller, set, context.observerIds);
  const subject = setSubject(set, context);
  const { job } = context;
  return {
    id: set.publicId,
    night: set.nightPublicId,
    night_date: set.nightDate,
    telescope: set.telescope,
    kind: set.kind,
    name: set.name,
    state: set.state,
    file_name: isWhole ? set.fileName : null,
    size: Number(set.size),
    sha256: set.sha256,
    tolerance: set.tolerance,
    mapping: isWhole ? set.mapping : {},
    comments: isWhole ? set.comments : '',
    rows: isWhole ? set.nRows : set.visibleRows,
    matched_rows: isWhole ? set.nMatched : null,
    frames_created: set.nFramesCreated,
    faults: set.nFaults,
    uploaded_by: set.uploadedBy,
    uploaded_at: set.createdAt.toISOString(),
    checked_at: set.checkedAt?.toISOString() ?? null,
    job: job ? { id: job.publicId, state: job.state, progress: job.progress, message: job.message } : null,
    is_whole: isWhole,
    may_check:
      isUnfinished(set) && (!job || hasEnded(job.state)) && may(caller, 'measurements.upload', subject),
    may_refuse: set.state === 'matched' && may(caller, 'measurements.refuse', subject),
  };
}

export const isUnfinished = (set: MeasurementSetRow): boolean =>
  set.state === 'received' || set.state === 'checked';
