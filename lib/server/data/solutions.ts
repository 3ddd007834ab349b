import 'server-only';
import type { NightState } from '@/lib/contracts/api/night';
import type { EvidenceItem, SolutionFinding, SolutionState, Verdict } from '@/lib/contracts/api/solution';
import type { SolutionInputs, SolutionModel } from '@/lib/contracts/solution-model';
import { Fault } from '@/lib/faults/fault';
import type { Scope } from '@/lib/server/policy/scope';
import { fromCursor, pageOf } from './cursor';
import { select, selectOne, type Tx } from './database';
import { observersOfNight, programmesInNight } from './measurement-sets';
import { visibleNights } from './visible';

export interface SolutionRow {
  readonly id: number;
  readonly publicId: string;
  readonly nightId: number;
  readonly nightPublicId: string;
  readonly nightDate: string;
  readonly nightState: NightState;
  readonly telescopeId: number;
  readonly telescope: string;
  readonly telescopeName: string;
  readonly number: number;
  readonly state: SolutionState;
  readonly model: SolutionModel;
  readonly inputs: SolutionInputs;
  readonly inputHash: string | null;
  readonly softwareVersion: string;
  readonly outcome: 'determined' | 'undetermined' | null;
  readonly findings: readonly SolutionFinding[] | null;
  readonly evidence: readonly EvidenceItem[] | null;
  readonly suggestedVerdict: Verdict | null;
  readonly verdict: Verdict | null;
  readonly nObservations: number;
  readonly nUsed: number;
  readonly nStars: number;
  readonly nFrames: number;
  readonly follows: string | null;
  readonly supersededBy: string | null;
  readonly version: number;
  readonly createdBy: string;
  readonly createdAt: Date;
  readonly solvedAt: Date | null;
  readonly proposedById: number | null;
  readonly proposedBy: string | null;
  readonly proposedAt: Date | null;
  readonly approvedBy: string | null;
  readonly approvedAt: Date | null;
  readonly withdrawnBy: string | null;
  readonly withdrawnAt: Date | null;
  /** When its night was last opened again since it was solved; null when it was not. */
  readonly reopenedAt: Date | null;
}

const columns = `
  s.id, s.public_id AS publicId, s.night_id AS nightId, n.public_id AS nightPublicId,
  DATE_FORMAT(n.date, '%Y-%m-%d') AS nightDate, n.state AS nightState, n.telescope_id AS telescopeId,
  t.code AS telescope, t.name AS telescopeName, s.number, s.state, s.model, s.inputs, s.input_hash AS inputHash,
  s.software_version AS softwareVersion, s.outcome, s.findings, s.evidence, s.suggested_verdict AS suggestedVerdict,
  s.verdict, s.n_observations AS nObservations, s.n_used AS nUsed, s.n_stars AS nStars, s.n_frames AS nFrames,
  e.public_id AS follows, l.public_id AS supersededBy, s.version,
  c.name AS createdBy, s.created_at AS createdAt, s.solved_at AS solvedAt,
  s.proposed_by_id AS proposedById, p.name AS proposedBy, s.proposed_at AS proposedAt,
  a.name AS approvedBy, s.approved_at AS approvedAt, w.name AS withdrawnBy, s.withdrawn_at AS withdrawnAt,
  (SELECT MAX(o.utc) FROM audit_events o
    WHERE o.night_id = s.night_id AND o.act = 'night.reopen' AND o.utc > s.solved_at) AS reopenedAt`;
const tables = `solutions s
  JOIN nights n ON n.id = s.night_id
  JOIN telescopes t ON t.id = n.telescope_id
  JOIN people c ON c.id = s.created_by_id
  LEFT JOIN people p ON p.id = s.proposed_by_id
  LEFT JOIN people a ON a.id = s.approved_by_id
  LEFT JOIN people w ON w.id = s.withdrawn_by_id
  LEFT JOIN solutions e ON e.id = s.follows_id
  LEFT JOIN solutions l ON l.id = s.superseded_by_id`;

/** A solution by its public id, if its night is in the scope. */
async function findSolution(scope: Scope, publicId: string, tx: Tx | null): Promise<SolutionRow | null> {
  const nights = visibleNights(scope);
  return selectOne<SolutionRow>(
    `SELECT ${columns} FROM ${tables} WHERE s.public_id = :publicId AND ${nights.sql}`,
    { publicId, ...nights.values },
    tx,
  );
}

/** The solution, or the refusal that tells nothing of whether there is one. */
export async function requireSolution(
  scope: Scope,
  publicId: string,
  tx: Tx | null = null,
): Promise<SolutionRow> {
  const solution = await findSolution(scope, publicId, tx);
  if (solution) return solution;
  throw new Fault('not-found', 'There is no such solution, or it is not yours to see.');
}

/** Solutions of a night in the scope, the newest first. */
export async function listSolutionRows(
  scope: Scope,
  nightId: number,
  page: { readonly after?: string | undefined; readonly limit: number },
): Promise<{ readonly rows: readonly SolutionRow[]; readonly next: string | null }> {
  const nights = visibleNights(scope);
  const after = fromCursor(page.after, ['number'])?.[0] ?? null;
  const rows = await select<SolutionRow>(
    `SELECT ${columns} FROM ${tables}
      WHERE s.night_id = :nightId AND ${nights.sql} AND (:after IS NULL OR s.number < :after)
      ORDER BY s.number DESC LIMIT :limit`,
    { nightId, after, limit: page.limit + 1, ...nights.values },
  );
  return pageOf(rows, page.limit, ({ number }) => [number]);
}

/** The newest job that solves each of a night's solutions, by the solution's public id. */
export async function solveJobs(nightId: number): Promise<ReadonlyMap<string, SolveJobRow>> {
  const rows = await select<SolveJobRow>(
    `SELECT JSON_VALUE(payload, '$.solution') AS solution, public_id AS publicId, state, progress, message
       FROM jobs WHERE night_id = :nightId AND kind = 'solve-night' ORDER BY id`,
    { nightId },
  );
  return new Map(rows.map((row) => [row.solution, row]));
}

export interface SolveJobRow {
  readonly solution: string;
  readonly publicId: string;
  readonly state: 'queued' | 'running' | 'done' | 'failed' | 'cancelled';
  readonly progress: number;
  readonly message: string;
}

/** What the rules of access must know of a night's solutions. */
export async function solutionSubject(nightId: number): Promise<{
  readonly observerIds: readonly number[];
  readonly programmeIds: readonly number[];
}> {
  const [observerIds, programmeIds] = await Promise.all([
    observersOfNight(nightId),
    programmesInNight(nightId),
  ]);
  return { observerIds, programmeIds };
}

/** The night of a solution, as the functions of its state name it. */
export const nightOf = (
  solution: SolutionRow,
): { readonly id: number; readonly publicId: string; readonly date: string } => ({
  id: solution.nightId,
  publicId: solution.nightPublicId,
  date: solution.nightDate,
});
