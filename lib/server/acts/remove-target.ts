import 'server-only';
import { starKey } from '@/lib/contracts/star-name';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { managedProgramme } from '@/lib/server/data/managed-programme';
import { deleteTarget, targetByKey } from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';

/** Takes a target off a programme's list. Frames of it keep their object and coordinates. */
export async function removeTarget(
  caller: PersonCaller,
  { programme: code, target }: { readonly programme: string; readonly target: string },
): Promise<{ readonly programme: string }> {
  return inTransaction(async (tx) => {
    const { id } = await managedProgramme(caller, code, tx);
    const present = await targetByKey(id, starKey(target), tx);
    if (!present) throw new Fault('not-found', `The programme has no target ${target}.`);
    await deleteTarget(present.id, tx);
    const { name, kind, ra, dec, note } = present;
    await recordAudit(tx, caller, {
      act: 'programme.target',
      subjectKind: 'programme',
      subjectId: code,
      programmeId: id,
      before: { name, kind, ra, dec, note },
    });
    return { programme: code };
  });
}
