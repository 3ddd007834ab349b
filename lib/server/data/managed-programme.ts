import 'server-only';
import { Fault } from '@/lib/faults/fault';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand, may } from '@/lib/server/policy/matrix';
import type { Tx } from './database';
import { lockProgramme, type ProgrammeRow } from './programmes';

/** The programme, held until the transaction ends, for a caller who may manage it. Who may not see it is told that it is not there. */
export async function managedProgramme(caller: PersonCaller, code: string, tx: Tx): Promise<ProgrammeRow> {
  const programme = await seenProgramme(caller, code, tx);
  demand(caller, 'programme.manage', { programmeIds: [programme.id] });
  return programme;
}

/** The same for any caller who may see it. */
export async function seenProgramme(caller: PersonCaller, code: string, tx: Tx): Promise<ProgrammeRow> {
  const programme = await lockProgramme(code, tx);
  if (!programme || !may(caller, 'programme.see', { programmeIds: [programme.id] })) {
    throw new Fault('not-found', 'There is no such programme.');
  }
  return programme;
}
