import 'server-only';
import type { Caller } from './caller';

/**
 * Which nights' and programmes' data a caller may see, as a value that every list of `lib/server/data` demands. A list
 * without a scope does not compile.
 */
export interface Scope {
  /** True: everything, for managers, photometrists and jobs. */
  readonly all: boolean;
  /** Programmes the person belongs to. */
  readonly programmeIds: readonly number[];
  /** The person whose nights as an observer count; null for nobody. */
  readonly observerId: number | null;
}

const everything: Scope = { all: true, programmeIds: [], observerId: null };

/** Scope for measurements, solutions, calibrated magnitudes and unreleased catalogues. */
export function dataScope(caller: Caller): Scope {
  if (caller.kind === 'job') return everything;
  if (caller.roles.has('manager') || caller.roles.has('photometrist')) return everything;
  return {
    all: false,
    programmeIds: [...caller.programmes.keys()],
    observerId: caller.roles.has('observer') ? caller.personId : null,
  };
}

/** Scope for the log itself: the observatory's staff see every night, investigators those with frames of their programmes. */
export function nightScope(caller: Caller): Scope {
  if (caller.kind === 'person' && caller.roles.has('observer')) return everything;
  return dataScope(caller);
}

/** Which jobs and audit rows are a caller's own: the matrix's `job.see` and `audit.see`, as a value for lists. */
export interface OwnScope {
  readonly all: boolean;
  readonly ownerId: number;
  readonly programmeIds: readonly number[];
}

export function ownScope(caller: Caller): OwnScope {
  // No person has the id 0.
  if (caller.kind === 'job') return { all: true, ownerId: 0, programmeIds: [] };
  return {
    all: caller.roles.has('manager'),
    ownerId: caller.personId,
    programmeIds: [...caller.programmes.keys()],
  };
}

/**
 * Which jobs a caller may see: those of `ownScope`, and those that work on the solutions of a night whose solutions they
 * may see.
 */
export interface JobScope extends OwnScope {
  readonly solutionsOf: Scope;
}

export const jobScope = (caller: Caller): JobScope => ({
  ...ownScope(caller),
  solutionsOf: dataScope(caller),
});

/** Scope for programmes themselves: the observatory's staff see all, investigators their own. */
export function programmeScope(caller: Caller): Scope {
  return nightScope(caller);
}
