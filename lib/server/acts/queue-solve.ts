import 'server-only';
import type { QueuedSolution } from '@/lib/contracts/api/solution';
import { completeModel } from '@/lib/contracts/complete-model';
import type { SolutionModel } from '@/lib/contracts/solution-model';
import type { SolveOptions } from '@/lib/contracts/solve-options';
import { Fault, type Issue } from '@/lib/faults/fault';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { lockNight } from '@/lib/server/data/night-state';
import { findNight, requireNight, subjectOf, type NightRow } from '@/lib/server/data/nights';
import {
  epochAt,
  matchedRows,
  setsWithStandards,
  sourcesOfSets,
  tallyStandards,
} from '@/lib/server/data/solve-inputs';
import type { ExclusionRow } from '@/lib/server/data/solution-writes';
import { queueDraft } from '@/lib/server/jobs/queue-draft';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand, may } from '@/lib/server/policy/matrix';
import { dataScope, nightScope } from '@/lib/server/policy/scope';

/**
 * Asks for a fit of a night's standards: a new draft and its job. A night need not be closed for it: whether the
 * standards suffice is asked while more can be taken. Only a closed night's solution can be proposed.
 */
export async function queueSolve(
  caller: PersonCaller,
  nightId: string,
  options: SolveOptions,
): Promise<QueuedSolution> {
  const night = await requireNight(nightScope(caller), nightId);
  demand(caller, 'solution.solve', subjectOf(night));
  if (options.exclusions.length > 0) demand(caller, 'solution.exclude', subjectOf(night));
  const issues: Issue[] = [];
  const joint = await jointNights(caller, { night, options, issues });
  const tally = await tallyStandards([night.id]);
  if (tally.length === 0) {
    throw new Fault(
      'conflict',
      `The night of ${night.date} has no measurements that match a standard star: there is nothing to solve.`,
    );
  }
  const { model: fit, issues: nonsense } = completeModel(
    options,
    tally.map(({ band }) => band),
  );
  issues.push(...nonsense);
  const nightIds = [night.id, ...joint.map(({ id }) => id)];
  return inTransaction(async (tx) => {
    await lockNight(tx, night);
    const exclusions = await exclusionRows(tx, { caller, options, nightIds, issues });
    if (issues.length > 0) {
      throw new Fault('invalid-input', 'The night cannot be solved in this way.', { issues });
    }
    const { exclusions: _, ...asked } = options;
    const model: SolutionModel = { options: asked, airmassFormula: options.airmass_formula, fit };
    const sets = await setsWithStandards(nightIds, tx);
    const epoch = await epochAt(night.telescopeId, night.date, tx);
    return queueDraft(tx, caller, {
      night,
      jointNightIds: nightIds.slice(1),
      model,
      inputs: {
        sets: sets.map(({ publicId, name, sha256 }) => ({ id: publicId, name, sha256 })),
        standardsSource: await sourcesOfSets(
          sets.map(({ id }) => id),
          tx,
        ),
        equipmentEpoch: epoch?.description ?? null,
        frameVersions: null,
      },
      exclusions,
      follows: null,
    });
  });
}

interface Asked {
  readonly night: NightRow;
  readonly options: SolveOptions;
  /** Grows by what is wrong. */
  readonly issues: Issue[];
}

/** The further nights, as far as they can be solved with this one: colour terms are shared within an epoch only. */
async function jointNights(
  caller: PersonCaller,
  { night, options, issues }: Asked,
): Promise<readonly NightRow[]> {
  const scope = dataScope(caller);
  const epoch = options.nights.length === 0 ? null : await epochAt(night.telescopeId, night.date);
  const joint: NightRow[] = [];
  for (const [place, id] of options.nights.entries()) {
    const wrong = (message: string): number => issues.push({ path: `nights.${place}`, value: id, message });
    const other = await findNight(scope, id);
    if (other === null) wrong('is no night, or not yours to see');
    else if (other.id === night.id) wrong('is the night itself');
    else if (joint.some((each) => each.id === other.id)) wrong('is named twice');
    else if (other.telescopeId !== night.telescopeId) wrong('is of another telescope');
    else if ((await epochAt(other.telescopeId, other.date))?.id !== epoch?.id)
      wrong('is of another equipment epoch');
    else if (!may(caller, 'solution.solve', subjectOf(other))) wrong('is not yours to solve');
    else if ((await tallyStandards([other.id])).length === 0) wrong('has no matched standards');
    else joint.push(other);
  }
  return joint;
}

interface Excluding {
  readonly caller: PersonCaller;
  readonly options: SolveOptions;
  readonly nightIds: readonly number[];
  readonly issues: Issue[];
}

/** The decisions on observations, as rows; each must be of a matched standard of the nights. */
async function exclusionRows(
  tx: Tx,
  { caller, options, nightIds, issues }: Excluding,
): Promise<readonly ExclusionRow[]> {
  const wanted = options.exclusions.map(({ observation }) => {
    const [set = '', row = ''] = observation.split('.');
    return { set, rowNo: Number(row) };
  });
  const found = await matchedRows(tx, nightIds, wanted);
  const seen = new Set<string>();
  return options.exclusions.flatMap(({ observation, reason, restore }, place) => {
    const row = found.get(observation);
    const path = `exclusions.${place}.observation`;
    if (seen.has(observation)) issues.push({ path, value: observation, message: 'is named twice' });
    else if (!row)
      issues.push({ path, value: observation, message: 'is no matched standard of the nights solved' });
    seen.add(observation);
    return row ? [{ ...row, isExcluded: !restore, reason, personId: caller.personId }] : [];
  });
}
