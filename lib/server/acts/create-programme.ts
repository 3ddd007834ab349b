import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { insertProgramme } from '@/lib/server/data/programmes';
import { newPublicId } from '@/lib/server/data/public-id';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface NewProgramme {
  readonly code: string;
  readonly title: string;
  readonly summary: string;
  readonly proprietaryMonths: number;
}

/** Adds an awarded programme; members and targets follow. */
export async function createProgramme(
  caller: PersonCaller,
  programme: NewProgramme,
): Promise<{ readonly programme: string }> {
  demand(caller, 'programme.manage');
  return inTransaction(async (tx) => {
    const id = await insertProgramme({ ...programme, publicId: newPublicId() }, tx);
    if (id === null) {
      throw new Fault('conflict', `There is a programme ${programme.code} already.`, {
        issues: [{ path: 'code', value: programme.code, message: 'is taken' }],
      });
    }
    await recordAudit(tx, caller, {
      act: 'programme.create',
      subjectKind: 'programme',
      subjectId: programme.code,
      programmeId: id,
      after: programme,
    });
    return { programme: programme.code };
  });
}
