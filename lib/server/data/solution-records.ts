import 'server-only';
import { database } from '@/db/connection';
import type { EvidenceItem, SolutionFinding, Verdict } from '@/lib/contracts/api/solution';
import type { SolutionInputs } from '@/lib/contracts/solution-model';
import { execute, type Tx } from './database';
import { loadRows } from './load-rows';

/** Columns of a file of observations, in their order. */
export const observationColumns = [
  'seq',
  'set_id',
  'row_no',
  'frame_id',
  'standard_id',
  'band',
  'airmass',
  'colour',
  'magnitude',
  'hours',
  'inst_mag',
  'inst_err',
  'residual',
  'standardised',
  'weight',
  'leverage',
  'influence',
  'is_used',
  'reason',
  'decided_by_id',
] as const;

/** Loads files of observations, tab-separated as `loadRows` says. */
export async function loadObservations(
  tx: Tx,
  solutionId: number,
  slices: readonly { readonly file: string; readonly rows: number }[],
): Promise<void> {
  for (const slice of slices) {
    await loadRows(tx, {
      ...slice,
      table: 'solution_observations',
      columns: observationColumns,
      set: { solution_id: String(solutionId) },
    });
  }
}

/** The sets that the solution was made from, and the zeros of time of its nights. */
export async function insertSolvedFrom(
  tx: Tx,
  solutionId: number,
  from: {
    readonly setIds: readonly number[];
    readonly nights: readonly { readonly id: number; readonly utcZero: Date | null }[];
  },
): Promise<void> {
  if (from.setIds.length > 0) {
    await database()
      .getQueryInterface()
      .bulkInsert(
        'solution_sets',
        from.setIds.map((setId) => ({ solution_id: solutionId, set_id: setId, purpose: 'standards' })),
        { transaction: tx },
      );
  }
  for (const { id, utcZero } of from.nights) {
    await execute(
      'UPDATE solution_nights SET utc_zero = :utcZero WHERE solution_id = :solutionId AND night_id = :nightId',
      { solutionId, nightId: id, utcZero },
      tx,
    );
  }
}

export interface SolvedColumns {
  readonly outcome: 'determined' | 'undetermined';
  readonly inputs: SolutionInputs;
  readonly inputHash: string;
  readonly findings: readonly SolutionFinding[];
  readonly evidence: readonly EvidenceItem[];
  readonly suggestedVerdict: Verdict;
  readonly nObservations: number;
  readonly nUsed: number;
  readonly nStars: number;
  readonly nFrames: number;
}

/** Writes what was found into a draft that has not been solved; returns false when it has been, or is no draft. */
export async function settleDraft(tx: Tx, solutionId: number, solved: SolvedColumns): Promise<boolean> {
  const touched = await execute(
    `UPDATE solutions
        SET outcome = :outcome, inputs = :inputs, input_hash = :inputHash, findings = :findings, evidence = :evidence,
            suggested_verdict = :suggestedVerdict, n_observations = :nObservations, n_used = :nUsed,
            n_stars = :nStars, n_frames = :nFrames, solved_at = NOW(3), version = version + 1
      WHERE id = :solutionId AND state = 'draft' AND outcome IS NULL`,
    {
      ...solved,
      solutionId,
      inputs: JSON.stringify(solved.inputs),
      findings: JSON.stringify(solved.findings),
      evidence: JSON.stringify(solved.evidence),
    },
    tx,
  );
  return touched === 1;
}
