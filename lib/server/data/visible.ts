import 'server-only';
import type { SqlValues } from './database';
import type { Scope } from '@/lib/server/policy/scope';

interface Condition {
  readonly sql: string;
  readonly values: SqlValues;
}

const everything: Condition = { sql: 'TRUE', values: {} };
/** No programme and no person has the id 0: an empty list is not valid SQL. */
const nobody = 0;

const valuesOf = (scope: Scope): SqlValues => ({
  scopeProgrammes: scope.programmeIds.length === 0 ? [nobody] : scope.programmeIds,
  scopeObserver: scope.observerId ?? nobody,
});

/** Nights in the scope: all, or those observed and those with a frame of one of the programmes. The alias is `n`. */
export function visibleNights(scope: Scope): Condition {
  if (scope.all) return everything;
  return {
    sql: `(EXISTS (SELECT 1 FROM frames sf WHERE sf.night_id = n.id AND sf.programme_id IN (:scopeProgrammes))
        OR EXISTS (SELECT 1 FROM night_observers so WHERE so.night_id = n.id AND so.person_id = :scopeObserver))`,
    values: valuesOf(scope),
  };
}

/**
 * Frames in the scope, within a night that is: the programmes' own, and calibration and standard frames that belong to
 * no programme. What another programme pointed at, or when, is not theirs to know. The alias is `f`.
 */
export function visibleFrames(scope: Scope): Condition {
  if (scope.all) return everything;
  return {
    sql: `(f.programme_id IN (:scopeProgrammes)
        OR (f.programme_id IS NULL AND f.type IN ('bias', 'dark', 'flat', 'standard'))
        OR EXISTS (SELECT 1 FROM night_observers so WHERE so.night_id = f.night_id AND so.person_id = :scopeObserver))`,
    values: valuesOf(scope),
  };
}

/**
 * Calibrated magnitudes in the scope: the programmes' own, and for the night's observers all of it. Those of targets
 * that belong to no programme are for staff and observers. The alias of their transformation is `t`.
 */
export function visibleResults(scope: Scope): Condition {
  if (scope.all) return everything;
  return {
    sql: `(t.programme_id IN (:scopeProgrammes)
        OR EXISTS (SELECT 1 FROM night_observers so WHERE so.night_id = t.night_id AND so.person_id = :scopeObserver))`,
    values: valuesOf(scope),
  };
}
