import 'server-only';
import type { Night, ReopenNight } from '@/lib/contracts/api/night';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { moveNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf, toNight } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Opens a closed or calibrated night again, for a reason that the audit trail keeps. */
export async function reopenNight(caller: PersonCaller, id: string, input: ReopenNight): Promise<Night> {
  const scope = nightScope(caller);
  const night = await requireNight(scope, id);
  demand(caller, 'night.reopen', subjectOf(night));
  return inTransaction(async (tx) => {
    const before = await moveNight(tx, night, {
      from: ['closed', 'calibrated'],
      to: 'open',
      version: input.version,
      set: { closed_by_id: null, closed_at: null, reopened_reason: input.reason },
    });
    await recordAudit(tx, caller, {
      act: 'night.reopen',
      subjectKind: 'night',
      subjectId: night.publicId,
      nightId: night.id,
      reason: input.reason,
      before: { state: before, closed_by: night.closedBy, closed_at: night.closedAt?.toISOString() ?? null },
      after: { state: 'open' },
    });
    return toNight(await requireNight(scope, id, tx));
  });
}
