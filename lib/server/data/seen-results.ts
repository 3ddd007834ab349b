import 'server-only';
import type { Scope } from '@/lib/server/policy/scope';
import { execute } from './database';
import { visibleResults } from './visible';

/** Remembers that the person has opened the results of the night that the scope lets see. */
export async function markResultsSeen(
  scope: Scope,
  personId: number,
  night: string,
  programme: string,
): Promise<void> {
  const results = visibleResults(scope);
  await execute(
    `INSERT IGNORE INTO seen_results (person_id, transformation_id)
     SELECT :personId, t.id FROM transformations t
       JOIN nights n ON n.id = t.night_id AND n.public_id = :night
       JOIN programmes g ON g.id = t.programme_id AND g.code = :programme
      WHERE t.state = 'done' AND ${results.sql}`,
    { personId, night, programme, ...results.values },
    null,
  );
}
