import 'server-only';
import {
  calibratedPerPage,
  mostDiagramStars,
  type CalibratedOrigin,
  type CalibratedPage,
  type CalibratedPageQuery,
  type CalibratedResult,
  type NoResult,
  type NumberedStar,
} from '@/lib/contracts/calibrated-page';
import { Fault } from '@/lib/faults/fault';
import { calibratedFlags, namesOfFlags, type CalibratedFlag } from '@/lib/photometry/calibrated-flags';
import {
  approvedSolution,
  listResultRows,
  latestTransformJob,
  type ResultRow,
} from '@/lib/server/data/calibrated-results';
import {
  countStars,
  diagramStars,
  listStars,
  placeOfStar,
  starSummary,
  type StarRow,
} from '@/lib/server/data/calibrated-stars';
import { nightById } from '@/lib/server/data/night-names';
import { findNight, requireNight, type NightRow } from '@/lib/server/data/nights';
import { solutionSubject } from '@/lib/server/data/solutions';
import type { Caller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';
import { dataScope, nightScope } from '@/lib/server/policy/scope';
import { readJob } from './job';

/** What a night's page of results shows: stars of one programme by one solution, or why there are none. */
export async function calibratedPage(
  caller: Caller,
  id: string,
  query: CalibratedPageQuery,
): Promise<CalibratedPage> {
  const night = await requireNight(nightScope(caller), id);
  const scope = dataScope(caller);
  const nothing = { night: id, programmes: [], programme: null, solutions: [] };
  if (!(await findNight(scope, id))) return { ...nothing, result: { why: 'hidden' } };
  const rows = await listResultRows(scope, night.id);
  const programme = query.programme ?? codeOf(rows[0]);
  if (programme === null) return { ...nothing, result: await whyNothing(caller, night.id, []) };
  const own = rows.filter((row) => codeOf(row) === programme);
  const made = own.filter(({ state }) => state === 'done');
  const row =
    query.solution === undefined
      ? made.find(({ solutionState }) => solutionState === 'approved')
      : made.find(({ solution }) => solution === query.solution);
  // Another's programme, or a solution that has no part in this night: an address where nothing is kept.
  if (own.length === 0 || (query.solution !== undefined && !row)) {
    throw new Fault('not-found', 'There are no such magnitudes of the night, or they are not yours to see.');
  }
  return {
    night: id,
    programmes: [...new Map(rows.map((one) => [codeOf(one) ?? '', one.programmeTitle ?? '']))].map(
      ([code, title]) => ({ code, title }),
    ),
    programme,
    solutions: made.map(({ solution, number, solutionState }) => ({
      id: solution,
      number,
      state: solutionState,
    })),
    result: row ? await resultOf(night, row, query) : await whyNothing(caller, night.id, own),
  };
}

/** Empty for targets of no programme; null where there is no row. */
const codeOf = (row: ResultRow | undefined): string | null => (row ? (row.programme ?? '') : null);

async function whyNothing(caller: Caller, nightId: number, own: readonly ResultRow[]): Promise<NoResult> {
  const row = own.find(({ solutionState, state }) => solutionState === 'approved' && state === 'queued');
  if (row) {
    const [id, subject] = await Promise.all([latestTransformJob(nightId), solutionSubject(nightId)]);
    const job = id === null ? null : await readJob(caller, id);
    const mayStart = may(caller, 'solution.transform', subject);
    return { why: 'running', job, solution: row.solution, mayStart };
  }
  const approved = await approvedSolution(nightId);
  if (approved?.verdict === 'not photometric') return { why: 'not-photometric', solution: approved.id };
  return { why: approved ? 'no-targets' : 'no-solution' };
}

const flags = Object.keys(calibratedFlags) as readonly CalibratedFlag[];
const bits = flags.map((flag) => calibratedFlags[flag].bit);

/** The most frequent first. */
const cautionsOf = (nFlagged: readonly number[]): CalibratedResult['cautions'] =>
  flags
    .map((flag, i) => ({ flag, nStars: nFlagged[i] ?? 0 }))
    .filter(({ nStars }) => nStars > 0)
    .toSorted((one, other) => other.nStars - one.nStars);

async function resultOf(
  night: NightRow,
  row: ResultRow,
  query: CalibratedPageQuery,
): Promise<CalibratedResult> {
  const [{ nFlagged, ...summary }, counts, place, origin] = await Promise.all([
    starSummary(row.id, bits),
    countStars(row.id, query),
    query.at === undefined ? null : placeOfStar(row.id, query, query.at),
    originOf(night, row),
  ]);
  const nPages = Math.max(1, Math.ceil(counts.nShown / calibratedPerPage));
  const wanted = place === null ? (query.page ?? 1) : Math.floor(place / calibratedPerPage) + 1;
  const page = Math.min(wanted, nPages);
  const [stars, diagram] = await Promise.all([
    listStars(row.id, query, { offset: (page - 1) * calibratedPerPage, limit: calibratedPerPage }),
    diagramStars(row.id, query, {
      step: Math.max(1, Math.ceil(counts.nDiagram / mostDiagramStars)),
      at: query.at,
    }),
  ]);
  const named = { programme: row.programme ?? '', solution: row.solution, night: night.date };
  return {
    ...summary,
    ...counts,
    cautions: cautionsOf(nFlagged),
    origin,
    stars: stars.map((star) => ({ ...withTotals(star), ...named })),
    page,
    nPages,
    diagram,
  };
}

async function originOf(night: NightRow, row: ResultRow): Promise<CalibratedOrigin> {
  const name = await nightById(night.id);
  return {
    observatory: name.observatory,
    telescope: name.telescopeName,
    solution: row.solution,
    number: row.number,
    state: row.solutionState,
    verdict: row.verdict,
    approvedBy: row.approvedBy,
    approvedAt: row.approvedAt?.toISOString() ?? null,
    standardsSource: row.standardsSource ?? 'not recorded',
    softwareVersion: row.softwareVersion,
    calculatedAt: row.finishedAt?.toISOString() ?? null,
  };
}

/** Root of the sum of squares; null where a part is not known. */
const total = (random: number | null, systematic: number | null): number | null =>
  random === null || systematic === null ? null : Math.hypot(random, systematic);

type Named = 'programme' | 'solution' | 'night';

const withTotals = ({ flags, ...row }: StarRow): Omit<NumberedStar, Named> => ({
  ...row,
  V_total: total(row.V_random, row.V_systematic),
  B_total: total(row.B_random, row.B_systematic),
  BV_total: total(row.BV_random, row.BV_systematic),
  UB_total: total(row.UB_random, row.UB_systematic),
  VR_total: total(row.VR_random, row.VR_systematic),
  VI_total: total(row.VI_random, row.VI_systematic),
  flags: [...namesOfFlags(flags)],
});
