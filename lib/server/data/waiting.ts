import 'server-only';
import type {
  WaitingNight,
  WaitingPerson,
  WaitingResult,
  WaitingSet,
  WaitingSolution,
  Waits,
} from '@/lib/contracts/waiting';
import type { OwnScope, Scope } from '@/lib/server/policy/scope';
import { select, selectOne, type SqlValues } from './database';
import { visibleNights, visibleResults } from './visible';

/** So many of a kind are named; of more there is only the number. */
const named = 100;
const nightColumns = `n.public_id AS night, DATE_FORMAT(n.date, '%Y-%m-%d') AS date, l.name AS telescope`;
const nightTables = 'nights n JOIN telescopes l ON l.id = n.telescope_id';

/** The first rows of a statement that ends before its LIMIT, and how many it has in all. */
async function waits<T extends object>(columns: string, rest: string, values: SqlValues): Promise<Waits<T>> {
  const rows = await select<T & { nAll: number }>(
    `SELECT ${columns}, COUNT(*) OVER () AS nAll FROM ${rest} LIMIT :named`,
    { ...values, named },
  );
  return { n: Number(rows[0]?.nAll ?? 0), first: rows.map(({ nAll: _, ...row }) => row as unknown as T) };
}

/** Nights that the person observes, open still; the latest first. */
export function openNightsOf(scope: Scope, personId: number): Promise<Waits<WaitingNight>> {
  const nights = visibleNights(scope);
  return waits(
    nightColumns,
    `${nightTables} JOIN night_observers o ON o.night_id = n.id AND o.person_id = :personId
      WHERE n.state = 'open' AND ${nights.sql} ORDER BY n.date DESC, n.id`,
    { personId, ...nights.values },
  );
}

/**
 * Tables with faults of the last 30 days, uploaded by the person or for a night of theirs, after which the night got
 * none of that kind that was taken.
 */
export function refusedSetsOf(scope: Scope, personId: number): Promise<Waits<WaitingSet>> {
  const nights = visibleNights(scope);
  return waits(
    `${nightColumns}, m.public_id AS \`set\`, m.name, m.n_faults AS nFaults`,
    `${nightTables} JOIN measurement_sets m ON m.night_id = n.id
      WHERE m.state = 'refused' AND m.n_faults > 0 AND m.created_at > NOW(3) - INTERVAL 30 DAY AND ${nights.sql}
        AND (m.uploaded_by_id = :personId
          OR EXISTS (SELECT 1 FROM night_observers o WHERE o.night_id = n.id AND o.person_id = :personId))
        AND NOT EXISTS (SELECT 1 FROM measurement_sets b
          WHERE b.night_id = n.id AND b.id > m.id AND b.kind = m.kind AND b.state <> 'refused')
      ORDER BY m.id DESC`,
    { personId, ...nights.values },
  );
}

/** Closed nights with matched standards and no solution that stands; the oldest first. */
export function unsolvedNights(scope: Scope): Promise<Waits<WaitingNight>> {
  const nights = visibleNights(scope);
  return waits(
    nightColumns,
    `${nightTables}
      WHERE n.state = 'closed' AND ${nights.sql}
        AND EXISTS (SELECT 1 FROM measurement_sets m
          WHERE m.night_id = n.id AND m.state IN ('matched', 'in use') AND m.n_matched > 0)
        AND NOT EXISTS (SELECT 1 FROM solutions s WHERE s.night_id = n.id AND s.state <> 'withdrawn')
        AND NOT EXISTS (SELECT 1 FROM solution_nights j JOIN solutions s ON s.id = j.solution_id
          WHERE j.night_id = n.id AND s.state <> 'withdrawn')
      ORDER BY n.date, n.id`,
    { ...nights.values },
  );
}

const solutionColumns = `${nightColumns}, s.public_id AS solution, s.number, s.outcome, p.name AS proposedBy`;
const solutionTables = `solutions s JOIN nights n ON n.id = s.night_id JOIN telescopes l ON l.id = n.telescope_id
  LEFT JOIN people p ON p.id = s.proposed_by_id`;

/** Drafts of the person that no other was made from, and after which none was approved; the latest first. */
export function draftsOf(scope: Scope, personId: number): Promise<Waits<WaitingSolution>> {
  const nights = visibleNights(scope);
  return waits(
    solutionColumns,
    `${solutionTables}
      WHERE s.state = 'draft' AND s.created_by_id = :personId AND ${nights.sql}
        AND NOT EXISTS (SELECT 1 FROM solutions b WHERE b.follows_id = s.id AND b.state <> 'withdrawn')
        AND NOT EXISTS (SELECT 1 FROM solutions b
          WHERE b.night_id = s.night_id AND b.number > s.number AND b.state IN ('proposed', 'approved'))
      ORDER BY s.id DESC`,
    { personId, ...nights.values },
  );
}

/** Proposals of other people than this one; the oldest first. */
export function proposalsFor(scope: Scope, personId: number): Promise<Waits<WaitingSolution>> {
  const nights = visibleNights(scope);
  return waits(
    solutionColumns,
    `${solutionTables}
      WHERE s.state = 'proposed' AND s.proposed_by_id <> :personId AND ${nights.sql}
      ORDER BY s.proposed_at, s.id`,
    { personId, ...nights.values },
  );
}

/** Results of the person's programmes by solutions that are approved now, not opened by them; the latest first. */
export function unseenResults(scope: Scope, personId: number): Promise<Waits<WaitingResult>> {
  const results = visibleResults(scope);
  return waits(
    `${nightColumns}, g.code AS programme, t.n_stars AS nStars, s.verdict`,
    `transformations t
       JOIN solutions s ON s.id = t.solution_id AND s.state = 'approved'
       JOIN programmes g ON g.id = t.programme_id
       JOIN programme_members b ON b.programme_id = g.id AND b.person_id = :personId
       JOIN nights n ON n.id = t.night_id JOIN telescopes l ON l.id = n.telescope_id
      WHERE t.state = 'done' AND ${results.sql}
        AND NOT EXISTS (SELECT 1 FROM seen_results e WHERE e.transformation_id = t.id AND e.person_id = :personId)
      ORDER BY t.finished_at DESC, t.id DESC`,
    { personId, ...results.values },
  );
}

/** People who were invited and have no password yet. Only for who may manage people. */
export function invitedPeople(): Promise<Waits<WaitingPerson>> {
  return waits(
    'p.name, p.email',
    `people p WHERE p.password_hash IS NULL AND p.disabled_at IS NULL ORDER BY p.id`,
    {},
  );
}

/** How many jobs in the scope have failed for good. */
export async function countFailedJobs(scope: OwnScope): Promise<number> {
  const row = await selectOne<{ n: number }>(
    `SELECT COUNT(*) AS n FROM jobs
      WHERE state = 'failed' AND (:all OR created_by_id = :owner OR programme_id IN (:programmes))`,
    {
      all: scope.all,
      owner: scope.ownerId,
      // An empty list is no SQL; no programme has the id 0.
      programmes: scope.programmeIds.length > 0 ? scope.programmeIds : [0],
    },
  );
  return Number(row?.n ?? 0);
}
