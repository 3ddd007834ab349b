import 'server-only';
import { database } from '@/db/connection';
import type { Condition, ConditionInput } from '@/lib/contracts/api/condition';
import type { Page } from '@/lib/contracts/common';
import { fromCursor, pageOf } from './cursor';
import { execute, select, selectOne, type Tx } from './database';
import { newPublicId } from './public-id';

interface ConditionRow {
  readonly id: number;
  readonly publicId: string;
  readonly utc: Date;
  readonly cloud: number | null;
  readonly seeing: number | null;
  readonly humidity: number | null;
  readonly wind: number | null;
  readonly windDirection: number | null;
  readonly temperature: number | null;
  readonly skyBrightness: number | null;
  readonly comment: string;
  readonly recordedBy: string;
}

const selection = `SELECT q.id, q.public_id AS publicId, q.utc, q.cloud, q.seeing, q.humidity, q.wind,
    q.wind_direction AS windDirection, q.temperature, q.sky_brightness AS skyBrightness, q.comment, p.name AS recordedBy
  FROM conditions q JOIN people p ON p.id = q.recorded_by_id`;

/** Conditions of a night that the caller may see, by time. */
export async function listConditionRows(
  nightId: number,
  page: Page,
): Promise<{ readonly rows: readonly ConditionRow[]; readonly next: string | null }> {
  const after = fromCursor(page.after, ['number', 'number']);
  const rows = await select<ConditionRow>(
    `${selection} WHERE q.night_id = :nightId ${
      after === null ? '' : 'AND (q.utc > :afterUtc OR (q.utc = :afterUtc AND q.id > :afterId))'
    } ORDER BY q.utc, q.id LIMIT :limit`,
    {
      nightId,
      afterUtc: after === null ? null : new Date(Number(after[0])),
      afterId: after?.[1] ?? null,
      limit: page.limit + 1,
    },
  );
  return pageOf(rows, page.limit, ({ utc, id }) => [utc.getTime(), id]);
}

/** Every entry of a night, by time: a night's page shows them all. */
export async function allConditionRows(nightId: number): Promise<readonly ConditionRow[]> {
  return select<ConditionRow>(`${selection} WHERE q.night_id = :nightId ORDER BY q.utc, q.id`, { nightId });
}

export async function findCondition(tx: Tx, nightId: number, publicId: string): Promise<ConditionRow | null> {
  return selectOne<ConditionRow>(
    `${selection} WHERE q.night_id = :nightId AND q.public_id = :publicId`,
    { nightId, publicId },
    tx,
  );
}

const columnsOf = (entry: ConditionInput): Record<string, string | number | Date | null> => ({
  utc: new Date(entry.utc),
  cloud: entry.cloud ?? null,
  seeing: entry.seeing ?? null,
  humidity: entry.humidity ?? null,
  wind: entry.wind ?? null,
  wind_direction: entry.wind_direction ?? null,
  temperature: entry.temperature ?? null,
  sky_brightness: entry.sky_brightness ?? null,
  comment: entry.comment,
});

const rowsPerInsert = 1000;

/** Writes entries; the caller holds the night. Returns them in the order given. */
export async function insertConditions(
  tx: Tx,
  recording: { readonly nightId: number; readonly recordedById: number },
  entries: readonly ConditionInput[],
): Promise<readonly ConditionRow[]> {
  const rows = entries.map((entry) => ({
    public_id: newPublicId(),
    night_id: recording.nightId,
    recorded_by_id: recording.recordedById,
    ...columnsOf(entry),
  }));
  for (let first = 0; first < rows.length; first += rowsPerInsert) {
    await database()
      .getQueryInterface()
      .bulkInsert('conditions', rows.slice(first, first + rowsPerInsert), { transaction: tx });
  }
  const written = await select<ConditionRow>(
    `${selection} WHERE q.public_id IN (:publicIds)`,
    { publicIds: rows.map((row) => row.public_id) },
    tx,
  );
  const byId = new Map(written.map((row) => [row.publicId, row]));
  return rows.flatMap((row) => byId.get(row.public_id) ?? []);
}

export async function updateCondition(tx: Tx, id: number, entry: ConditionInput): Promise<void> {
  const columns = columnsOf(entry);
  const set = Object.keys(columns).map((column) => `${column} = :${column}`);
  await execute(`UPDATE conditions SET ${set.join(', ')} WHERE id = :id`, { ...columns, id }, tx);
}

export async function deleteCondition(tx: Tx, id: number): Promise<void> {
  await execute('DELETE FROM conditions WHERE id = :id', { id }, tx);
}

/** An entry as the interface gives it. */
export const toCondition = (row: ConditionRow): Condition => ({
  id: row.publicId,
  utc: row.utc.toISOString(),
  cloud: row.cloud,
  seeing: row.seeing,
  humidity: row.humidity,
  wind: row.wind,
  wind_direction: row.windDirection,
  temperature: row.temperature,
  sky_brightness: row.skyBrightness,
  comment: row.comment,
  recorded_by: row.recordedBy,
});
