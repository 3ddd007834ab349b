import 'server-only';
import { execute, select, selectOne, type Tx } from './database';
import { newPublicId } from './public-id';
import { isTargetRow } from './target-tables';

/** Rows of a night that are targets; `q` counts a set's rows on a frame. */
const targetRows = `measurement_set_frames q
  JOIN measurement_sets m ON m.id = q.set_id
  JOIN frames f ON f.id = q.frame_id
 WHERE m.night_id = :nightId AND ${isTargetRow}`;

/** Programmes whose targets were measured in a night; null for frames that belong to none. */
async function targetProgrammes(tx: Tx, nightId: number): Promise<readonly (number | null)[]> {
  const rows = await select<{ id: number | null }>(
    `SELECT DISTINCT f.programme_id AS id FROM ${targetRows} ORDER BY id`,
    { nightId },
    tx,
  );
  return rows.map(({ id }) => id);
}

/** Asks for the night's targets on the standard system, one transformation a programme. Returns how many there are. */
export async function queueTransformations(tx: Tx, solutionId: number, nightId: number): Promise<number> {
  const programmes = await targetProgrammes(tx, nightId);
  for (const programmeId of programmes) {
    await execute(
      `INSERT INTO transformations (public_id, solution_id, night_id, programme_id)
       VALUES (:publicId, :solutionId, :nightId, :programmeId)`,
      { publicId: newPublicId(), solutionId, nightId, programmeId },
      tx,
    );
  }
  return programmes.length;
}

/** Transformations of a solution that was replaced: those not made yet never will be; the others stay to be read. */
export async function dropQueuedTransformations(tx: Tx, solutionId: number): Promise<number> {
  return execute(
    `UPDATE transformations SET state = 'withdrawn', finished_at = NOW(3)
      WHERE solution_id = :solutionId AND state = 'queued'`,
    { solutionId },
    tx,
  );
}

/** Transformations of a solution that was withdrawn. */
export async function withdrawTransformations(tx: Tx, solutionId: number): Promise<number> {
  return execute(
    `UPDATE transformations SET state = 'withdrawn', finished_at = COALESCE(finished_at, NOW(3))
      WHERE solution_id = :solutionId AND state <> 'withdrawn'`,
    { solutionId },
    tx,
  );
}

export interface TargetInvestigator {
  readonly personId: number;
  readonly email: string;
  readonly name: string;
  /** Codes of the person's programmes with targets in the night, with commas between. */
  readonly programmes: string;
  /** Whether any of them has magnitudes of the night. */
  readonly hasMagnitudes: 0 | 1;
}

/** PI and co-investigators of the programmes whose targets were measured in a night, who can still sign in. */
export function targetInvestigators(tx: Tx, nightId: number): Promise<readonly TargetInvestigator[]> {
  return select<TargetInvestigator>(
    `SELECT p.id AS personId, p.email, p.name, GROUP_CONCAT(g.code ORDER BY g.code) AS programmes,
            EXISTS (SELECT 1 FROM transformations t JOIN programme_members o ON o.programme_id = t.programme_id
                     WHERE t.night_id = :nightId AND t.state = 'done' AND o.person_id = p.id) AS hasMagnitudes
       FROM programme_members b
       JOIN people p ON p.id = b.person_id AND p.disabled_at IS NULL
       JOIN programmes g ON g.id = b.programme_id
      WHERE b.programme_id IN (SELECT f.programme_id FROM ${targetRows})
      GROUP BY p.id, p.email, p.name ORDER BY p.id`,
    { nightId },
    tx,
  );
}

interface TargetSpan {
  readonly airmassMin: number;
  readonly airmassMax: number;
  readonly utcFirst: Date;
  readonly utcLast: Date;
}

/** What a night's targets span in airmass and time; null without any. */
export async function targetSpan(nightId: number): Promise<TargetSpan | null> {
  const rows = await select<TargetSpan>(
    `SELECT MIN(f.airmass) AS airmassMin, MAX(f.airmass) AS airmassMax,
            MIN(f.utc_mid) AS utcFirst, MAX(f.utc_mid) AS utcLast
       FROM ${targetRows} AND f.airmass IS NOT NULL HAVING COUNT(*) > 0`,
    { nightId },
  );
  return rows[0] ?? null;
}

export interface ApprovalCounts {
  /** Measurements of targets. */
  readonly nMagnitudes: number;
  readonly nProgrammes: number;
  readonly nInvestigators: number;
}

/** What there is to transform in a night, and whom it concerns, as things stand now. */
export async function approvalCounts(nightId: number): Promise<ApprovalCounts> {
  const counted = await selectOne<{ nMagnitudes: number; nProgrammes: number }>(
    `SELECT CAST(COALESCE(SUM(q.n_rows), 0) AS INT) AS nMagnitudes, COUNT(DISTINCT f.programme_id) AS nProgrammes
       FROM ${targetRows}`,
    { nightId },
  );
  const people = await selectOne<{ n: number }>(
    `SELECT COUNT(DISTINCT b.person_id) AS n
       FROM programme_members b JOIN people p ON p.id = b.person_id AND p.disabled_at IS NULL
      WHERE b.programme_id IN (SELECT f.programme_id FROM ${targetRows})`,
    { nightId },
  );
  return {
    nMagnitudes: Number(counted?.nMagnitudes ?? 0),
    nProgrammes: Number(counted?.nProgrammes ?? 0),
    nInvestigators: Number(people?.n ?? 0),
  };
}
