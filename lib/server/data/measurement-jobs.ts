import 'server-only';
import type { JobState } from '@/lib/contracts/api/job';
import { select, type Tx } from './database';

export interface CheckJobRow {
  readonly set: string;
  readonly publicId: string;
  readonly state: JobState;
  readonly progress: number;
  readonly message: string;
}

/** The newest job that checks each of a night's sets, by the set's public id. */
export async function checkJobs(
  nightId: number,
  tx: Tx | null = null,
): Promise<ReadonlyMap<string, CheckJobRow>> {
  const rows = await select<CheckJobRow>(
    `SELECT JSON_VALUE(payload, '$.set') AS \`set\`, public_id AS publicId, state, progress, message
       FROM jobs WHERE night_id = :nightId AND kind = 'check-measurements' ORDER BY id`,
    { nightId },
    tx,
  );
  return new Map(rows.map((row) => [row.set, row]));
}
