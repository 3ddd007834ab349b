import 'server-only';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { updateProgramme } from '@/lib/server/data/programmes';
import { managedProgramme } from '@/lib/server/data/managed-programme';
import type { PersonCaller } from '@/lib/server/policy/caller';

interface Changed {
  readonly programme: string;
  readonly title: string;
  readonly summary: string;
  readonly proprietaryMonths: number;
}

/** Changes title, summary and proprietary period of a programme; its code stays, for clients know it by that. */
export async function changeProgramme(
  caller: PersonCaller,
  { programme: code, ...changed }: Changed,
): Promise<{ readonly programme: string }> {
  return inTransaction(async (tx) => {
    const { id, title, summary, proprietaryMonths } = await managedProgramme(caller, code, tx);
    const change = differences({ title, summary, proprietaryMonths }, changed);
    if (Object.keys(change.after).length === 0) return { programme: code };
    await updateProgramme(id, changed, tx);
    await recordAudit(tx, caller, {
      act: 'programme.change',
      subjectKind: 'programme',
      subjectId: code,
      programmeId: id,
      ...change,
    });
    return { programme: code };
  });
}
