import 'server-only';
import { outsideNight } from '@/lib/contracts/api/night';
import type { Remark, RemarkInput } from '@/lib/contracts/api/remark';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { boundsOf, requireNight, subjectOf, type NightRow } from '@/lib/server/data/nights';
import { newPublicId } from '@/lib/server/data/public-id';
import { findRemark, insertRemark, toRemark } from '@/lib/server/data/remarks';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Writes a remark into a night of any state: what is learnt in the morning belongs to the night. */
export async function addRemark(caller: PersonCaller, id: string, input: RemarkInput): Promise<Remark> {
  const night = await requireNight(nightScope(caller), id);
  demand(caller, 'night.log', subjectOf(night));
  if (input.utc !== undefined) refuseOutside(input.utc, night);
  const utc = input.utc === undefined ? nowIn(night) : new Date(input.utc);
  const publicId = newPublicId();
  return inTransaction(async (tx) => {
    await insertRemark(tx, {
      publicId,
      nightId: night.id,
      utc,
      text: input.text,
      writtenById: caller.personId,
    });
    const row = await findRemark(tx, night.id, publicId);
    if (!row) throw new Error('A remark is gone within its transaction.');
    const remark = toRemark(row);
    await recordAudit(tx, caller, {
      act: 'remark.add',
      subjectKind: 'remark',
      subjectId: publicId,
      nightId: night.id,
      after: remark,
    });
    return remark;
  });
}

function refuseOutside(utc: string, night: NightRow): void {
  const message = outsideNight(utc, boundsOf(night));
  if (message === null) return;
  throw new Fault('invalid-input', 'The remark does not belong to this night.', {
    issues: [{ path: 'utc', value: utc, message }],
  });
}

/** This moment or, when the night is over, its end; when it has not begun, its beginning. */
function nowIn({ startsAt, endsAt }: NightRow): Date {
  return new Date(Math.min(Math.max(Date.now(), startsAt.getTime()), endsAt.getTime() - 1));
}
