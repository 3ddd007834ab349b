import 'server-only';
import type { ObjectName, ObjectQuery } from '@/lib/contracts/api/object-name';
import { nameHolds, objectNames as allObjectNames } from '@/lib/server/data/object-places';
import type { Caller } from '@/lib/server/policy/caller';
import { nightScope } from '@/lib/server/policy/scope';

/** Names that complete in the log, with coordinates: targets of the programmes that the caller may see, and standard fields. */
export async function objectNames(
  caller: Caller,
  query: ObjectQuery,
): Promise<{ readonly items: readonly ObjectName[]; readonly next: null }> {
  const names = await allObjectNames(nightScope(caller));
  return { items: names.filter(({ name }) => nameHolds(name, query.q)).slice(0, query.limit), next: null };
}
