import 'server-only';
import { readSettings, type Settings } from '@/lib/contracts/settings';
import { Fault } from '@/lib/faults/fault';
import { observatory } from '@/lib/server/data/observatory';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** The observatory's name and rules, completed by the defaults. */
export async function observatorySettings(
  caller: PersonCaller,
): Promise<{ readonly name: string; readonly settings: Settings }> {
  demand(caller, 'settings.manage');
  const present = await observatory();
  if (!present) throw new Fault('not-found', 'There is no observatory yet.');
  return { name: present.name, settings: readSettings(present.settings) };
}
