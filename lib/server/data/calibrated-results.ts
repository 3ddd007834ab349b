import 'server-only';
import type { Solution } from '@/lib/contracts/api/solution';
import type { Scope } from '@/lib/server/policy/scope';
import { select, selectOne } from './database';
import { visibleResults } from './visible';

/** One programme's magnitudes of one night by one solution. */
export interface ResultRow {
  readonly id: number;
  readonly state: 'queued' | 'done';
  readonly finishedAt: Date | null;
  /** Null for targets of no programme. */
  readonly programme: string | null;
  readonly programmeTitle: string | null;
  readonly solution: string;
  readonly number: number;
  readonly solutionState: 'approved' | 'superseded';
  readonly verdict: Solution['verdict'];
  readonly softwareVersion: string;
  readonly standardsSource: string | null;
  readonly approvedBy: string | null;
  readonly approvedAt: Date | null;
  /** What it was made with, as it was stored; null until it is made. */
  readonly options: unknown;
}

/** Results of a night in the scope, made or on their way: by programme, of each the latest approved solution first. */
export async function listResultRows(scope: Scope, nightId: number): Promise<readonly ResultRow[]> {
  const results = visibleResults(scope);
  return select<ResultRow>(
    `SELECT t.id, t.state, t.finished_at AS finishedAt, g.code AS programme, g.title AS programmeTitle,
            s.public_id AS solution, s.number, s.state AS solutionState, s.verdict,
            s.software_version AS softwareVersion, JSON_VALUE(s.inputs, '$.standardsSource') AS standardsSource,
            a.name AS approvedBy, s.approved_at AS approvedAt, t.options
       FROM transformations t
       JOIN solutions s ON s.id = t.solution_id
       LEFT JOIN programmes g ON g.id = t.programme_id
       LEFT JOIN people a ON a.id = s.approved_by_id
      WHERE t.night_id = :nightId AND t.state IN ('queued', 'done') AND s.state IN ('approved', 'superseded')
        AND ${results.sql}
      ORDER BY g.code IS NULL, g.code, s.approved_at DESC, s.id DESC`,
    { nightId, ...results.values },
  );
}

/** The night's approved solution, of which there is one at most. One that was only joined with it calibrates another night. */
export function approvedSolution(
  nightId: number,
): Promise<{ readonly id: string; readonly verdict: Solution['verdict'] } | null> {
  return selectOne(
    `SELECT public_id AS id, verdict FROM solutions WHERE state = 'approved' AND night_id = :nightId`,
    { nightId },
  );
}

/** Public id of the newest job that transforms the night's targets. */
export async function latestTransformJob(nightId: number): Promise<string | null> {
  const row = await selectOne<{ id: string }>(
    `SELECT public_id AS id FROM jobs
      WHERE night_id = :nightId AND kind = 'transform-targets' ORDER BY jobs.id DESC LIMIT 1`,
    { nightId },
  );
  return row?.id ?? null;
}
