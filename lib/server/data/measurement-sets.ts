import 'server-only';
import type { ColumnMapping } from '@/lib/contracts/measurement-columns';
import type { MeasurementKind, MeasurementSetState } from '@/lib/contracts/measurement-kinds';
import { Fault } from '@/lib/faults/fault';
import type { Scope } from '@/lib/server/policy/scope';
import { fromCursor, pageOf } from './cursor';
import { execute, insert, select, selectOne, type Tx } from './database';
import { visibleFrames, visibleNights } from './visible';

export interface MeasurementSetRow {
  readonly id: number;
  readonly publicId: string;
  readonly nightId: number;
  readonly nightPublicId: string;
  readonly nightDate: string;
  readonly telescope: string;
  readonly telescopeName: string;
  readonly kind: MeasurementKind;
  readonly name: string;
  readonly state: MeasurementSetState;
  readonly fileName: string;
  readonly contentType: string;
  readonly size: number;
  readonly sha256: string;
  /** [arcsec] */
  readonly tolerance: number;
  readonly mapping: ColumnMapping;
  readonly comments: string;
  readonly nRows: number | null;
  readonly nMatched: number | null;
  readonly nFramesCreated: number;
  readonly nFaults: number;
  readonly uploadedById: number;
  readonly uploadedBy: string;
  readonly checkedAt: Date | null;
  readonly createdAt: Date;
  /** 1 when the set has rows on a frame that the scope does not hold. */
  readonly hasHiddenFrames: number;
  /** Rows on frames that it does hold. */
  readonly visibleRows: number;
}

const columns = (frameSql: string): string => `
  m.id, m.public_id AS publicId, m.night_id AS nightId, n.public_id AS nightPublicId,
  DATE_FORMAT(n.date, '%Y-%m-%d') AS nightDate, t.code AS telescope, t.name AS telescopeName, m.kind, m.name, m.state,
  m.file_name AS fileName, m.content_type AS contentType, m.size, m.sha256, m.tolerance, m.mapping, m.comments,
  m.n_rows AS nRows, m.n_matched AS nMatched, m.n_frames_created AS nFramesCreated, m.n_faults AS nFaults,
  m.uploaded_by_id AS uploadedById, p.name AS uploadedBy, m.checked_at AS checkedAt, m.created_at AS createdAt,
  EXISTS (SELECT 1 FROM measurement_set_frames q JOIN frames f ON f.id = q.frame_id
           WHERE q.set_id = m.id AND NOT ${frameSql}) AS hasHiddenFrames,
  (SELECT CAST(COALESCE(SUM(q.n_rows), 0) AS INT) FROM measurement_set_frames q JOIN frames f ON f.id = q.frame_id
    WHERE q.set_id = m.id AND ${frameSql}) AS visibleRows`;
const tables = `measurement_sets m
  JOIN nights n ON n.id = m.night_id
  JOIN telescopes t ON t.id = n.telescope_id
  JOIN people p ON p.id = m.uploaded_by_id`;

/** A set by its public id, if its night is in the scope. */
export async function findSet(
  scope: Scope,
  publicId: string,
  tx: Tx | null = null,
): Promise<MeasurementSetRow | null> {
  const [nights, frames] = [visibleNights(scope), visibleFrames(scope)];
  return selectOne<MeasurementSetRow>(
    `SELECT ${columns(frames.sql)} FROM ${tables} WHERE m.public_id = :publicId AND ${nights.sql}`,
    { publicId, ...nights.values, ...frames.values },
    tx,
  );
}

/** The set, or the refusal that tells nothing of whether there is one. */
export async function requireSet(
  scope: Scope,
  publicId: string,
  tx: Tx | null = null,
): Promise<MeasurementSetRow> {
  const set = await findSet(scope, publicId, tx);
  if (set) return set;
  throw new Fault('not-found', 'There is no such measurement set, or it is not yours to see.');
}

/** Sets of a night in the scope, the newest first. */
export async function listSetRows(
  scope: Scope,
  nightId: number,
  page: { readonly after?: string | undefined; readonly limit: number },
): Promise<{ readonly rows: readonly MeasurementSetRow[]; readonly next: string | null }> {
  const [nights, frames] = [visibleNights(scope), visibleFrames(scope)];
  const after = fromCursor(page.after, ['number'])?.[0] ?? null;
  const rows = await select<MeasurementSetRow>(
    `SELECT ${columns(frames.sql)} FROM ${tables}
      WHERE m.night_id = :nightId AND ${nights.sql} AND (:after IS NULL OR m.id < :after)
      ORDER BY m.id DESC LIMIT :limit`,
    { nightId, after, limit: page.limit + 1, ...nights.values, ...frames.values },
  );
  return pageOf(rows, page.limit, ({ id }) => [id]);
}

/** How many sets of the night are in the scope; null when the night's measurements are not. */
export async function countSets(scope: Scope, nightId: number): Promise<number | null> {
  const nights = visibleNights(scope);
  const row = await selectOne<{ sets: number }>(
    `SELECT (SELECT COUNT(*) FROM measurement_sets m WHERE m.night_id = n.id) AS \`sets\`
       FROM nights n WHERE n.id = :nightId AND ${nights.sql}`,
    { nightId, ...nights.values },
  );
  return row && Number(row.sets);
}

export interface NewSet {
  readonly publicId: string;
  readonly nightId: number;
  readonly kind: MeasurementKind;
  readonly name: string;
  readonly fileName: string;
  readonly contentType: string;
  readonly size: number;
  readonly sha256: string;
  readonly tolerance: number;
  readonly mapping: ColumnMapping;
  readonly uploadedById: number;
}

export async function insertSet(tx: Tx, set: NewSet): Promise<number> {
  return insert(
    `INSERT INTO measurement_sets
       (public_id, night_id, kind, name, file_name, content_type, size, sha256, tolerance, mapping, comments, uploaded_by_id)
     VALUES (:publicId, :nightId, :kind, :name, :fileName, :contentType, :size, :sha256, :tolerance, :mapping, '', :uploadedById)`,
    { ...set, mapping: JSON.stringify(set.mapping) },
    tx,
  );
}

/** A set of the night that holds the same bytes and was not refused. */
export async function setWithBytes(
  tx: Tx,
  nightId: number,
  sha256: string,
): Promise<{ readonly publicId: string; readonly name: string } | null> {
  return selectOne(
    `SELECT public_id AS publicId, name FROM measurement_sets
      WHERE night_id = :nightId AND sha256 = :sha256 AND state <> 'refused' ORDER BY id DESC LIMIT 1`,
    { nightId, sha256 },
    tx,
  );
}

export interface SetMove {
  readonly from: readonly MeasurementSetState[];
  readonly to: MeasurementSetState;
  /** Columns that change with the state. */
  readonly set?: Readonly<Record<string, string | number | Date | null>>;
}

/** The one way in which a set's state changes: of two at once the second is refused. */
export async function moveSet(
  tx: Tx,
  set: { readonly id: number; readonly name: string },
  move: SetMove,
): Promise<void> {
  const values = move.set ?? {};
  const assignments = Object.keys(values).map((column) => `, ${column} = :${column}`);
  const touched = await execute(
    `UPDATE measurement_sets SET state = :toState${assignments.join('')}
      WHERE id = :setId AND state IN (:fromStates)`,
    { ...values, toState: move.to, setId: set.id, fromStates: move.from },
    tx,
  );
  if (touched === 1) return;
  const now = await selectOne<{ state: MeasurementSetState }>(
    'SELECT state FROM measurement_sets WHERE id = :setId',
    { setId: set.id },
    tx,
  );
  throw new Fault('conflict', `The set “${set.name}” is ${now?.state ?? 'gone'} by now.`);
}

/** Holds the set for this transaction, and tells its present state. */
export async function lockSet(tx: Tx, setId: number): Promise<MeasurementSetState | null> {
  const row = await selectOne<{ state: MeasurementSetState }>(
    'SELECT state FROM measurement_sets WHERE id = :setId FOR UPDATE',
    { setId },
    tx,
  );
  return row?.state ?? null;
}

/** Programmes with frames in the night: what an investigator's rights depend on. */
export async function programmesInNight(nightId: number, tx: Tx | null = null): Promise<readonly number[]> {
  const rows = await select<{ id: number }>(
    'SELECT DISTINCT programme_id AS id FROM frames WHERE night_id = :nightId AND programme_id IS NOT NULL',
    { nightId },
    tx,
  );
  return rows.map(({ id }) => id);
}

/** Observers of the night, by internal id. */
export async function observersOfNight(nightId: number, tx: Tx | null = null): Promise<readonly number[]> {
  const rows = await select<{ id: number }>(
    'SELECT person_id AS id FROM night_observers WHERE night_id = :nightId',
    { nightId },
    tx,
  );
  return rows.map(({ id }) => id);
}

/** Those of the originals that a set names, in whatever state: a refused table is kept too. */
export async function originalsInUse(sha256s: readonly string[]): Promise<ReadonlySet<string>> {
  if (sha256s.length === 0) return new Set();
  const rows = await select<{ sha256: string }>(
    'SELECT DISTINCT sha256 FROM measurement_sets WHERE sha256 IN (:sha256s)',
    { sha256s },
  );
  return new Set(rows.map(({ sha256 }) => sha256));
}
