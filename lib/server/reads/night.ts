import 'server-only';
import type { Night } from '@/lib/contracts/api/night';
import { requireNight, toNight } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { nightScope } from '@/lib/server/policy/scope';

/** One night that the caller may see. */
export const night = async (caller: Caller, id: string): Promise<Night> =>
  toNight(await requireNight(nightScope(caller), id));
