import 'server-only';
import type { JobScope } from '@/lib/server/policy/scope';
import { execute, select, selectOne, type SqlValues, type Tx } from './database';
import { visibleNights } from './visible';

export interface NewJobRow {
  readonly publicId: string;
  readonly kind: string;
  /** JSON. */
  readonly payload: string;
  readonly dedupeKey: string | null;
  readonly priority: number;
  /** Null for at once. */
  readonly runAfter: Date | null;
  readonly maxTries: number;
  readonly createdById: number | null;
  readonly nightId: number | null;
  readonly programmeId: number | null;
}

/** Writes a queued job, unless one with its key lives; returns the public id of the one that there is now. */
export async function insertJob(tx: Tx, job: NewJobRow): Promise<string> {
  await execute(
    // The update changes nothing: it locks the living job, so that it cannot end before this transaction does.
    `INSERT INTO jobs (public_id, kind, payload, dedupe_key, priority, run_after, max_tries, created_by_id, night_id, programme_id)
     VALUES (:publicId, :kind, :payload, :dedupeKey, :priority, COALESCE(:runAfter, NOW(3)), :maxTries, :createdById, :nightId, :programmeId)
     ON DUPLICATE KEY UPDATE id = id`,
    { ...job },
    tx,
  );
  if (job.dedupeKey === null) return job.publicId;
  const living = await selectOne<{ publicId: string }>(
    'SELECT public_id AS publicId FROM jobs WHERE dedupe_key = :key',
    { key: job.dedupeKey },
    tx,
  );
  return living?.publicId ?? job.publicId;
}

/** Whether a job with the key is queued or running. */
export async function hasLivingJob(tx: Tx, dedupeKey: string): Promise<boolean> {
  const row = await selectOne('SELECT id FROM jobs WHERE dedupe_key = :dedupeKey', { dedupeKey }, tx);
  return row !== null;
}

export type JobState = 'queued' | 'running' | 'done' | 'failed' | 'cancelled';

export interface JobRow {
  readonly id: number;
  readonly publicId: string;
  readonly kind: string;
  readonly payload: unknown;
  readonly state: JobState;
  readonly runAfter: Date;
  readonly tries: number;
  readonly maxTries: number;
  readonly progress: number;
  readonly message: string;
  readonly result: unknown;
  readonly error: unknown;
  readonly isCancelRequested: 0 | 1;
  readonly createdById: number | null;
  readonly createdBy: string | null;
  readonly programmeId: number | null;
  /** It works on a solution of its night. */
  readonly isOfSolution: 0 | 1;
  /** Internal ids with commas between: who observed that night, and the programmes with frames in it. */
  readonly nightObservers: string | null;
  readonly nightProgrammes: string | null;
  readonly nightPublicId: string | null;
  readonly nightDate: string | null;
  readonly telescope: string | null;
  readonly mailSubject: string | null;
  readonly mailRecipient: string | null;
  readonly setName: string | null;
  readonly setPublicId: string | null;
  readonly solutionNumber: number | null;
  readonly solutionPublicId: string | null;
  readonly createdAt: Date;
  readonly startedAt: Date | null;
  readonly finishedAt: Date | null;
}

const ofSolution = `j.kind IN ('solve-night', 'transform-targets')`;

const jobRows = `SELECT j.id, j.public_id AS publicId, j.kind, j.payload, j.state, j.run_after AS runAfter, j.tries,
       j.max_tries AS maxTries, j.progress, j.message, j.result, j.error,
       j.cancel_requested_at IS NOT NULL AS isCancelRequested, j.created_by_id AS createdById, p.name AS createdBy,
       j.programme_id AS programmeId, ${ofSolution} AS isOfSolution,
       (SELECT GROUP_CONCAT(o.person_id) FROM night_observers o
         WHERE o.night_id = j.night_id AND ${ofSolution}) AS nightObservers,
       (SELECT GROUP_CONCAT(DISTINCT f.programme_id) FROM frames f
         WHERE f.night_id = j.night_id AND ${ofSolution}) AS nightProgrammes,
       n.public_id AS nightPublicId, n.date AS nightDate, t.code AS telescope,
       m.subject AS mailSubject, m.recipient AS mailRecipient, s.name AS setName, s.public_id AS setPublicId,
       q.number AS solutionNumber, q.public_id AS solutionPublicId,
       j.created_at AS createdAt, j.started_at AS startedAt, j.finished_at AS finishedAt
  FROM jobs j
  LEFT JOIN people p ON p.id = j.created_by_id
  LEFT JOIN nights n ON n.id = j.night_id
  LEFT JOIN telescopes t ON t.id = n.telescope_id
  LEFT JOIN mails m ON j.kind = 'send-mail'
    AND m.public_id = CONVERT(JSON_VALUE(j.payload, '$.mail') USING ascii) COLLATE ascii_bin
  LEFT JOIN measurement_sets s ON j.kind = 'check-measurements'
    AND s.public_id = CONVERT(JSON_VALUE(j.payload, '$.set') USING ascii) COLLATE ascii_bin
  LEFT JOIN solutions q ON ${ofSolution}
    AND q.public_id = CONVERT(JSON_VALUE(j.payload, '$.solution') USING ascii) COLLATE ascii_bin`;

/** One job; asks for no scope, because whoever calls asks policy with what it finds. */
export function findJob(publicId: string, tx: Tx | null = null): Promise<JobRow | null> {
  return selectOne<JobRow>(`${jobRows} WHERE j.public_id = :publicId`, { publicId }, tx);
}

/** Locks a job until the transaction ends and tells its state; null when there is none. */
export async function lockJob(tx: Tx, id: number): Promise<JobState | null> {
  const row = await selectOne<{ state: JobState }>(
    'SELECT state FROM jobs WHERE id = :id FOR UPDATE',
    { id },
    tx,
  );
  return row?.state ?? null;
}

/** The same jobs in one query, for those who watch them. */
export async function findJobs(publicIds: readonly string[]): Promise<readonly JobRow[]> {
  if (publicIds.length === 0) return [];
  return select<JobRow>(`${jobRows} WHERE j.public_id IN (:publicIds)`, { publicIds });
}

export interface JobFilter {
  readonly state?: JobState | undefined;
  readonly kind?: string | undefined;
  /** Internal id of the last job of the page before. */
  readonly before: number | null;
  readonly limit: number;
}

/** Jobs in the scope. The alias of the job is `j`, of its night `n`. */
function visibleJobs(scope: JobScope): { readonly sql: string; readonly values: SqlValues } {
  const nights = visibleNights(scope.solutionsOf);
  return {
    sql: `(:all OR j.created_by_id = :owner OR j.programme_id IN (:programmes) OR (${ofSolution} AND ${nights.sql}))`,
    values: {
      all: scope.all,
      owner: scope.ownerId,
      // An empty list is no SQL; no programme has the id 0.
      programmes: scope.programmeIds.length > 0 ? scope.programmeIds : [0],
      ...nights.values,
    },
  };
}

/** Jobs within the scope, the newest first. */
export function listJobs(scope: JobScope, filter: JobFilter): Promise<readonly JobRow[]> {
  const jobs = visibleJobs(scope);
  const where = [jobs.sql];
  if (filter.state !== undefined) where.push('j.state = :state');
  if (filter.kind !== undefined) where.push('j.kind = :kind');
  if (filter.before !== null) where.push('j.id < :before');
  return select<JobRow>(`${jobRows} WHERE ${where.join(' AND ')} ORDER BY j.id DESC LIMIT :limit`, {
    ...jobs.values,
    state: filter.state ?? null,
    kind: filter.kind ?? null,
    before: filter.before,
    limit: filter.limit,
  });
}

/** How many jobs within the scope are in each state. */
export function countJobs(scope: JobScope): Promise<readonly { state: JobState; n: number }[]> {
  const jobs = visibleJobs(scope);
  return select(
    `SELECT j.state, COUNT(*) AS n FROM jobs j LEFT JOIN nights n ON n.id = j.night_id
      WHERE ${jobs.sql} GROUP BY j.state`,
    jobs.values,
  );
}

/** Whether a job of the kind was made in the last `minutes`, or still waits or runs. */
export async function hasRecentJob(tx: Tx, kind: string, minutes: number): Promise<boolean> {
  const row = await selectOne(
    `SELECT id FROM jobs
      WHERE kind = :kind AND (state IN ('queued','running') OR created_at > NOW(3) - INTERVAL :minutes MINUTE) LIMIT 1`,
    { kind, minutes },
    tx,
  );
  return row !== null;
}
