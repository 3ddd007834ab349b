import 'server-only';
import type { PersonListed } from '@/lib/contracts/people';
import { listPeople } from '@/lib/server/data/people';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand, may } from '@/lib/server/policy/matrix';

/** Everybody with an account, by name, and whether the caller may change them. */
export async function people(
  caller: PersonCaller,
): Promise<{ readonly people: readonly PersonListed[]; readonly mayManage: boolean }> {
  demand(caller, 'people.see');
  return { people: await listPeople(), mayManage: may(caller, 'people.manage') };
}
