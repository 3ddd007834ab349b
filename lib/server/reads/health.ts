import 'server-only';
import packageFile from '@/package.json';
import { selectOne } from '@/lib/server/data/database';
import { isOutage } from '@/lib/server/data/outage';

export interface HealthState {
  readonly status: 'ok' | 'degraded';
  readonly database: 'ok' | 'unreachable';
  readonly version: string;
}

/** Whether the database answers, and which version this is. */
export async function health(): Promise<HealthState> {
  const { version } = packageFile;
  try {
    await selectOne('SELECT 1 AS one');
    return { status: 'ok', database: 'ok', version };
  } catch (error) {
    // An unreachable database is this call's answer, not its failure.
    if (!isOutage(error)) throw error;
    return { status: 'degraded', database: 'unreachable', version };
  }
}
