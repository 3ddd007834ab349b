import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { seenProgramme } from '@/lib/server/data/managed-programme';
import { endProprietaryPeriod as end } from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

/** Ends the proprietary period of a programme early: its releases become public. Only its PI may, and it cannot be undone. */
export async function endProprietaryPeriod(
  caller: PersonCaller,
  { programme: code }: { readonly programme: string },
): Promise<{ readonly programme: string }> {
  return inTransaction(async (tx) => {
    const { id, proprietaryUntil } = await seenProgramme(caller, code, tx);
    demand(caller, 'release.end-proprietary-period', { programmeIds: [id] });
    if (!(await end(id, tx))) throw new Fault('conflict', 'The proprietary period was ended before.');
    await recordAudit(tx, caller, {
      act: 'programme.end-proprietary-period',
      subjectKind: 'programme',
      subjectId: code,
      programmeId: id,
      before: { proprietaryUntil },
      after: { proprietaryUntil: 'ended' },
    });
    return { programme: code };
  });
}
