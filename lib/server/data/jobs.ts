import 'server-only';
import { execute, selectOne, type Tx } from './database';

export interface JobRow {
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
export async function insertJob(tx: Tx, job: JobRow): Promise<string> {
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
