import 'server-only';
import type { Night, NightState, NightQuery } from '@/lib/contracts/api/night';
import { Fault } from '@/lib/faults/fault';
import type { Scope } from '@/lib/server/policy/scope';
import { fromCursor, pageOf } from './cursor';
import { select, selectOne, type SqlValues, type Tx } from './database';
import { visibleFrames, visibleNights } from './visible';

export interface ObserverRow {
  readonly personId: number;
  readonly publicId: string;
  readonly name: string;
}

export interface NightRow {
  readonly id: number;
  readonly publicId: string;
  readonly telescopeId: number;
  readonly telescope: string;
  readonly date: string;
  readonly state: NightState;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly summary: string;
  readonly version: number;
  readonly openedBy: string;
  readonly closedBy: string | null;
  readonly closedAt: Date | null;
  readonly reopenedReason: string | null;
  /** Frames in the scope that was asked with. */
  readonly frames: number;
  readonly conditions: number;
  readonly minutesLost: number;
  readonly observers: readonly ObserverRow[];
}
type Stored = Omit<NightRow, 'observers'>;

/** Counts come from the indices of each table by night: no row of frames is read. */
const columns = (frameSql: string): string => `
  n.id, n.public_id AS publicId, n.telescope_id AS telescopeId, t.code AS telescope,
  DATE_FORMAT(n.date, '%Y-%m-%d') AS date, n.state, n.starts_at AS startsAt, n.ends_at AS endsAt, n.summary, n.version,
  o.name AS openedBy, c.name AS closedBy, n.closed_at AS closedAt, n.reopened_reason AS reopenedReason,
  (SELECT COUNT(*) FROM frames f WHERE f.night_id = n.id AND ${frameSql}) AS frames,
  (SELECT COUNT(*) FROM conditions q WHERE q.night_id = n.id) AS conditions,
  CAST((SELECT COALESCE(SUM(l.minutes), 0) FROM time_losses l WHERE l.night_id = n.id) AS INT) AS minutesLost`;
const tables = `nights n
  JOIN telescopes t ON t.id = n.telescope_id
  JOIN people o ON o.id = n.opened_by_id
  LEFT JOIN people c ON c.id = n.closed_by_id`;

async function withObservers(rows: readonly Stored[], tx: Tx | null): Promise<readonly NightRow[]> {
  if (rows.length === 0) return [];
  const observers = await select<ObserverRow & { nightId: number }>(
    `SELECT w.night_id AS nightId, p.id AS personId, p.public_id AS publicId, p.name
       FROM night_observers w JOIN people p ON p.id = w.person_id
      WHERE w.night_id IN (:nights) ORDER BY p.name, p.id`,
    { nights: rows.map(({ id }) => id) },
    tx,
  );
  return rows.map((row) => ({
    ...row,
    observers: observers
      .filter(({ nightId }) => nightId === row.id)
      .map(({ personId, publicId, name }) => ({ personId, publicId, name })),
  }));
}

/** A night by its public id, if the scope holds it. */
export async function findNight(
  scope: Scope,
  publicId: string,
  tx: Tx | null = null,
): Promise<NightRow | null> {
  const [nights, frames] = [visibleNights(scope), visibleFrames(scope)];
  const row = await selectOne<Stored>(
    `SELECT ${columns(frames.sql)} FROM ${tables} WHERE n.public_id = :publicId AND ${nights.sql}`,
    { publicId, ...nights.values, ...frames.values },
    tx,
  );
  return row && ((await withObservers([row], tx))[0] ?? null);
}

/** The night, or the refusal that tells nothing of whether there is one. */
export async function requireNight(scope: Scope, publicId: string, tx: Tx | null = null): Promise<NightRow> {
  const night = await findNight(scope, publicId, tx);
  if (night) return night;
  throw new Fault('not-found', 'There is no such night, or it is not yours to see.');
}

/** Those of the nights that the scope holds. */
export async function visibleNightIds(scope: Scope, ids: readonly number[]): Promise<ReadonlySet<number>> {
  if (scope.all || ids.length === 0) return new Set(ids);
  const nights = visibleNights(scope);
  const rows = await select<{ id: number }>(
    `SELECT n.id FROM nights n WHERE n.id IN (:ids) AND ${nights.sql}`,
    {
      ids,
      ...nights.values,
    },
  );
  return new Set(rows.map(({ id }) => id));
}

export interface NightPage {
  readonly rows: readonly NightRow[];
  readonly next: string | null;
}

/** Nights in the scope, the latest date first. */
export async function listNightRows(scope: Scope, query: NightQuery): Promise<NightPage> {
  const [nights, frames] = [visibleNights(scope), visibleFrames(scope)];
  const after = fromCursor(query.after, ['string', 'number']);
  const conditions = [
    nights.sql,
    query.telescope === undefined ? '' : 't.code = :telescope',
    query.from === undefined ? '' : 'n.date >= :from',
    query.to === undefined ? '' : 'n.date <= :to',
    query.state === undefined ? '' : 'n.state = :state',
    after === null ? '' : '(n.date < :afterDate OR (n.date = :afterDate AND n.id < :afterId))',
  ].filter((sql) => sql !== '');
  const values: SqlValues = {
    ...nights.values,
    ...frames.values,
    telescope: query.telescope ?? null,
    from: query.from ?? null,
    to: query.to ?? null,
    state: query.state ?? null,
    afterDate: after?.[0] ?? null,
    afterId: after?.[1] ?? null,
    limit: query.limit + 1,
  };
  const rows = await select<Stored>(
    `SELECT ${columns(frames.sql)} FROM ${tables} WHERE ${conditions.join(' AND ')}
      ORDER BY n.date DESC, n.id DESC LIMIT :limit`,
    values,
  );
  const page = pageOf(rows, query.limit, ({ date, id }) => [date, id]);
  return { rows: await withObservers(page.rows, null), next: page.next };
}

/** The night's bounds as the interface writes them. */
export const boundsOf = (row: NightRow): { readonly starts_at: string; readonly ends_at: string } => ({
  starts_at: row.startsAt.toISOString(),
  ends_at: row.endsAt.toISOString(),
});

/** What the rules of access must know of the night. */
export const subjectOf = (row: NightRow): { readonly observerIds: readonly number[] } => ({
  observerIds: row.observers.map(({ personId }) => personId),
});

/** A night as the interface gives it. */
export const toNight = (row: NightRow): Night => ({
  id: row.publicId,
  telescope: row.telescope,
  date: row.date,
  state: row.state,
  ...boundsOf(row),
  summary: row.summary,
  observers: row.observers.map(({ publicId, name }) => ({ id: publicId, name })),
  opened_by: row.openedBy,
  closed_by: row.closedBy,
  closed_at: row.closedAt?.toISOString() ?? null,
  reopened_reason: row.reopenedReason,
  version: row.version,
  frames: row.frames,
  conditions: row.conditions,
  minutes_lost: row.minutesLost,
});
