import 'server-only';
import type { Solution, SolutionComment, SolutionObservation } from '@/lib/contracts/api/solution';
import type { Band } from '@/lib/contracts/bands';
import type { List, Page } from '@/lib/contracts/common';
import { readSettings } from '@/lib/contracts/settings';
import { requireNight, visibleNightIds } from '@/lib/server/data/nights';
import { observatory } from '@/lib/server/data/observatory';
import { bandsOf } from '@/lib/server/data/solution-bands';
import { solutionChanges } from '@/lib/server/data/solution-changes';
import { listObservationRows, type ObservationRow } from '@/lib/server/data/solution-observations';
import { commentsOf, exclusionsOf } from '@/lib/server/data/solution-writes';
import {
  listSolutionRows,
  requireSolution,
  solutionSubject,
  solveJobs,
  type SolutionRow,
} from '@/lib/server/data/solutions';
import type { Caller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';
import { shownSolution } from './solution-shown';

/** One solution that the caller may see. */
export async function readSolution(caller: Caller, id: string): Promise<Solution> {
  const row = await requireSolution(dataScope(caller), id);
  const [solution] = await shown(caller, row.nightId, [row]);
  if (!solution) throw new Error(`The solution ${id} was lost on its way.`);
  return solution;
}

/** Solutions of a night that the caller may see, the newest first. */
export async function nightSolutions(caller: Caller, nightId: string, page: Page): Promise<List<Solution>> {
  const scope = dataScope(caller);
  const night = await requireNight(scope, nightId);
  const { rows, next } = await listSolutionRows(scope, night.id, page);
  return { items: await shown(caller, night.id, rows), next };
}

/** Solutions of one night with all that belongs to them, in a fixed number of queries. */
async function shown(
  caller: Caller,
  nightId: number,
  rows: readonly SolutionRow[],
): Promise<readonly Solution[]> {
  const ids = rows.map(({ id }) => id);
  const [bands, exclusions, jobs, changes, subject, house] = await Promise.all([
    bandsOf(ids),
    exclusionsOf(ids),
    solveJobs(nightId),
    solutionChanges(ids),
    solutionSubject(nightId),
    observatory(),
  ]);
  const visibleNights = await visibleNightIds(dataScope(caller), [
    nightId,
    ...bands.map((band) => band.nightId),
  ]);
  const settings = readSettings(house?.settings);
  return rows.map((row) =>
    shownSolution(caller, row, {
      bands: bands.filter(({ solutionId }) => solutionId === row.id),
      exclusions: exclusions.filter(({ solutionId }) => solutionId === row.id),
      job: jobs.get(row.publicId),
      changes: changes.get(row.id),
      visibleNights,
      subject,
      settings,
    }),
  );
}

/** What the fit was given, on frames that the caller may see, in order of time. */
export async function solutionResiduals(
  caller: Caller,
  id: string,
  query: Page & { readonly band?: Band | undefined },
): Promise<List<SolutionObservation>> {
  const scope = dataScope(caller);
  const solution = await requireSolution(scope, id);
  const { rows, next } = await listObservationRows(scope, solution.id, query);
  return { items: rows.map(toObservation), next };
}

const toObservation = (row: ObservationRow): SolutionObservation => ({
  observation: `${row.set}.${row.rowNo}`,
  night_date: row.nightDate,
  frame: row.frame,
  star: row.star,
  band: row.band,
  utc_mid: row.utcMid.toISOString(),
  airmass: row.airmass,
  colour: row.colour,
  magnitude: row.magnitude,
  inst_mag: row.instMag,
  inst_err: row.instErr,
  residual: row.residual,
  standardised: row.standardised,
  weight: row.weight,
  leverage: row.leverage,
  influence: row.influence,
  used: row.isUsed === 1,
  reason: row.reason,
  decided_by: row.decidedBy,
});

/** What people said about a solution, the oldest first. */
export async function solutionComments(caller: Caller, id: string): Promise<List<SolutionComment>> {
  const solution = await requireSolution(dataScope(caller), id);
  const comments = await commentsOf(solution.id);
  const items = comments.map(({ createdAt, ...comment }) => ({ ...comment, at: createdAt.toISOString() }));
  return { items, next: null };
}
