import 'server-only';
import type { SavedMapping } from '@/lib/contracts/api/measurement-set';
import type { List } from '@/lib/contracts/common';
import { mappingsOf, type MappingRow } from '@/lib/server/data/check-inputs';
import { requireNight } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { nightScope } from '@/lib/server/policy/scope';

/** How tables of the night's telescope are read, as people said. */
export async function columnMappings(caller: Caller, nightId: string): Promise<List<SavedMapping>> {
  const night = await requireNight(nightScope(caller), nightId);
  return { items: (await mappingsOf(night.telescopeId)).map(toMapping), next: null };
}

export const toMapping = (row: MappingRow): SavedMapping => ({
  headers: [...row.headers],
  mapping: row.mapping,
  saved_by: row.savedBy,
  saved_at: row.savedAt.toISOString(),
});
