import 'server-only';
import { select } from './database';

export interface SolutionChangeRow {
  readonly solutionId: number;
  /** Sum of the present versions of the frames that it used. */
  readonly frameVersions: number;
  /** Names of its sets that were taken back since. */
  readonly refusedSets: string | null;
  /** Names of sets with standards of its nights that came after it. */
  readonly newSets: string | null;
  /** Names of sets with targets of its night that came after its approval. */
  readonly newTargets: string | null;
}

/** What has changed beneath solutions since they were solved, or approved. */
export async function solutionChanges(
  solutionIds: readonly number[],
): Promise<ReadonlyMap<number, SolutionChangeRow>> {
  if (solutionIds.length === 0) return new Map();
  const names = `GROUP_CONCAT(DISTINCT m.name ORDER BY m.id SEPARATOR '”, “')`;
  const rows = await select<SolutionChangeRow>(
    `SELECT s.id AS solutionId,
            (SELECT CAST(COALESCE(SUM(f.version), 0) AS INT) FROM frames f
              WHERE f.id IN (SELECT o.frame_id FROM solution_observations o WHERE o.solution_id = s.id)) AS frameVersions,
            (SELECT ${names} FROM solution_sets q JOIN measurement_sets m ON m.id = q.set_id
              WHERE q.solution_id = s.id AND m.state = 'refused') AS refusedSets,
            (SELECT ${names} FROM measurement_sets m
              WHERE m.night_id IN (SELECT w.night_id FROM solution_nights w WHERE w.solution_id = s.id)
                AND m.kind IN ('standard', 'mixed') AND m.state IN ('matched', 'in use') AND m.n_matched > 0
                AND m.checked_at > s.solved_at
                AND NOT EXISTS (SELECT 1 FROM solution_sets q WHERE q.solution_id = s.id AND q.set_id = m.id)) AS newSets,
            (SELECT ${names} FROM measurement_sets m
              WHERE m.night_id = s.night_id AND m.kind IN ('target', 'mixed') AND m.state IN ('matched', 'in use')
                AND s.approved_at IS NOT NULL AND m.checked_at > s.approved_at) AS newTargets
       FROM solutions s WHERE s.id IN (:solutionIds) AND s.outcome IS NOT NULL`,
    { solutionIds },
  );
  return new Map(rows.map((row) => [row.solutionId, row]));
}
