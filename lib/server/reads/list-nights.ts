import 'server-only';
import type { Night, NightQuery } from '@/lib/contracts/api/night';
import type { List } from '@/lib/contracts/common';
import { listNightRows, toNight } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { nightScope } from '@/lib/server/policy/scope';

/** Nights that the caller may see, the latest first. */
export async function listNights(caller: Caller, query: NightQuery): Promise<List<Night>> {
  const { rows, next } = await listNightRows(nightScope(caller), query);
  return { items: rows.map(toNight), next };
}
