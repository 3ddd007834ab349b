import 'server-only';
import type { Remark } from '@/lib/contracts/api/remark';
import type { Page } from '@/lib/contracts/common';
import { fromCursor, pageOf } from './cursor';
import { execute, insert, select, selectOne, type Tx } from './database';

interface RemarkRow {
  readonly id: number;
  readonly publicId: string;
  readonly utc: Date;
  readonly text: string;
  readonly writtenBy: string;
}

const selection = `SELECT r.id, r.public_id AS publicId, r.utc, r.text, p.name AS writtenBy
  FROM remarks r JOIN people p ON p.id = r.written_by_id`;

/** Remarks of a night that the caller may see, by time. */
export async function listRemarkRows(
  nightId: number,
  page: Page,
): Promise<{ readonly rows: readonly RemarkRow[]; readonly next: string | null }> {
  const after = fromCursor(page.after, ['number', 'number']);
  const rows = await select<RemarkRow>(
    `${selection} WHERE r.night_id = :nightId ${
      after === null ? '' : 'AND (r.utc > :afterUtc OR (r.utc = :afterUtc AND r.id > :afterId))'
    } ORDER BY r.utc, r.id LIMIT :limit`,
    {
      nightId,
      afterUtc: after === null ? null : new Date(Number(after[0])),
      afterId: after?.[1] ?? null,
      limit: page.limit + 1,
    },
  );
  return pageOf(rows, page.limit, ({ utc, id }) => [utc.getTime(), id]);
}

/** Every remark of a night, by time: a night's page shows them all. */
export async function allRemarkRows(nightId: number): Promise<readonly RemarkRow[]> {
  return select<RemarkRow>(`${selection} WHERE r.night_id = :nightId ORDER BY r.utc, r.id`, { nightId });
}

export async function findRemark(tx: Tx, nightId: number, publicId: string): Promise<RemarkRow | null> {
  return selectOne<RemarkRow>(
    `${selection} WHERE r.night_id = :nightId AND r.public_id = :publicId`,
    { nightId, publicId },
    tx,
  );
}

interface NewRemark {
  readonly publicId: string;
  readonly nightId: number;
  readonly utc: Date;
  readonly text: string;
  readonly writtenById: number;
}

export async function insertRemark(tx: Tx, remark: NewRemark): Promise<void> {
  await insert(
    `INSERT INTO remarks (public_id, night_id, utc, text, written_by_id)
     VALUES (:publicId, :nightId, :utc, :text, :writtenById)`,
    { ...remark },
    tx,
  );
}

export async function updateRemark(
  tx: Tx,
  id: number,
  remark: { readonly utc: Date; readonly text: string },
): Promise<void> {
  await execute('UPDATE remarks SET utc = :utc, text = :text WHERE id = :id', { ...remark, id }, tx);
}

export async function deleteRemark(tx: Tx, id: number): Promise<void> {
  await execute('DELETE FROM remarks WHERE id = :id', { id }, tx);
}

/** A remark as the interface gives it. */
export const toRemark = (row: RemarkRow): Remark => ({
  id: row.publicId,
  utc: row.utc.toISOString(),
  text: row.text,
  written_by: row.writtenBy,
});
