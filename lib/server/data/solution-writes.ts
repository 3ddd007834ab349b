import 'server-only';
import { database } from '@/db/connection';
import type { SolutionInputs, SolutionModel } from '@/lib/contracts/solution-model';
import { execute, insert, select, selectOne, type Tx } from './database';

export interface NewSolution {
  readonly publicId: string;
  readonly nightId: number;
  readonly model: SolutionModel;
  readonly inputs: SolutionInputs;
  readonly softwareVersion: string;
  readonly followsId: number | null;
  readonly createdById: number;
}

/** Writes a draft with the night's next number; the caller holds the night, so that no number is given twice. */
export async function insertSolution(tx: Tx, solution: NewSolution): Promise<{ id: number; number: number }> {
  const last = await selectOne<{ number: number | null }>(
    'SELECT MAX(number) AS number FROM solutions WHERE night_id = :nightId',
    { nightId: solution.nightId },
    tx,
  );
  const number = (last?.number ?? 0) + 1;
  const id = await insert(
    `INSERT INTO solutions (public_id, night_id, number, model, inputs, software_version, follows_id, created_by_id)
     VALUES (:publicId, :nightId, :number, :model, :inputs, :softwareVersion, :followsId, :createdById)`,
    {
      ...solution,
      number,
      model: JSON.stringify(solution.model),
      inputs: JSON.stringify(solution.inputs),
    },
    tx,
  );
  return { id, number };
}

/** The nights whose standards it is made from, its own among them. */
export async function insertSolutionNights(
  tx: Tx,
  solutionId: number,
  nightIds: readonly number[],
): Promise<void> {
  await database()
    .getQueryInterface()
    .bulkInsert(
      'solution_nights',
      nightIds.map((nightId) => ({ solution_id: solutionId, night_id: nightId })),
      { transaction: tx },
    );
}

/** A person's decision on one observation. */
export interface ExclusionRow {
  readonly setId: number;
  readonly rowNo: number;
  readonly isExcluded: boolean;
  readonly reason: string;
  readonly personId: number;
}

export async function insertExclusions(
  tx: Tx,
  solutionId: number,
  rows: readonly ExclusionRow[],
): Promise<void> {
  if (rows.length === 0) return;
  await database()
    .getQueryInterface()
    .bulkInsert(
      'solution_exclusions',
      rows.map((row) => ({
        solution_id: solutionId,
        set_id: row.setId,
        row_no: row.rowNo,
        is_excluded: row.isExcluded,
        reason: row.reason,
        person_id: row.personId,
      })),
      { transaction: tx },
    );
}

export interface StoredExclusion extends ExclusionRow {
  readonly solutionId: number;
  readonly set: string;
  readonly person: string;
}

/** People's decisions that the solutions were made with. */
export async function exclusionsOf(
  solutionIds: readonly number[],
  tx: Tx | null = null,
): Promise<readonly StoredExclusion[]> {
  if (solutionIds.length === 0) return [];
  const rows = await select<Omit<StoredExclusion, 'isExcluded'> & { readonly isExcluded: number }>(
    `SELECT x.solution_id AS solutionId, x.set_id AS setId, m.public_id AS \`set\`, x.row_no AS rowNo,
            x.is_excluded AS isExcluded, x.reason, x.person_id AS personId, p.name AS person
       FROM solution_exclusions x
       JOIN measurement_sets m ON m.id = x.set_id
       JOIN people p ON p.id = x.person_id
      WHERE x.solution_id IN (:solutionIds) ORDER BY x.solution_id, x.set_id, x.row_no`,
    { solutionIds },
    tx,
  );
  return rows.map((row) => ({ ...row, isExcluded: row.isExcluded === 1 }));
}

/** Writes what a person said; an act without words leaves no comment. */
export async function insertComment(
  tx: Tx,
  comment: {
    readonly solutionId: number;
    readonly personId: number;
    readonly act: CommentRow['act'];
    readonly text: string;
  },
): Promise<void> {
  if (comment.text === '') return;
  await execute(
    `INSERT INTO solution_comments (solution_id, person_id, act, text)
     VALUES (:solutionId, :personId, :act, :text)`,
    { ...comment },
    tx,
  );
}

export interface CommentRow {
  readonly act: 'comment' | 'propose' | 'approve' | 'withdraw';
  readonly text: string;
  readonly by: string;
  readonly createdAt: Date;
}

/** What people said about a solution, the oldest first. */
export async function commentsOf(solutionId: number, tx: Tx | null = null): Promise<readonly CommentRow[]> {
  return select<CommentRow>(
    `SELECT c.act, c.text, p.name AS \`by\`, c.created_at AS createdAt
       FROM solution_comments c JOIN people p ON p.id = c.person_id
      WHERE c.solution_id = :solutionId ORDER BY c.id`,
    { solutionId },
    tx,
  );
}
