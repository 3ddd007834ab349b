import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { managedProgramme } from '@/lib/server/data/managed-programme';
import { setArchived } from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';

interface Archived {
  readonly programme: string;
  readonly isArchived: boolean;
}

/** Puts a finished programme into the archive, where it takes no new frames, or takes it back. Its data stay readable. */
export async function archiveProgramme(
  caller: PersonCaller,
  { programme: code, isArchived }: Archived,
): Promise<{ readonly programme: string }> {
  return inTransaction(async (tx) => {
    const { id } = await managedProgramme(caller, code, tx);
    if (!(await setArchived(id, isArchived, tx))) {
      throw new Fault('conflict', isArchived ? 'It is archived already.' : 'It is not archived.');
    }
    await recordAudit(tx, caller, {
      act: isArchived ? 'programme.archive' : 'programme.take-back',
      subjectKind: 'programme',
      subjectId: code,
      programmeId: id,
      before: { isArchived: !isArchived },
      after: { isArchived },
    });
    return { programme: code };
  });
}
