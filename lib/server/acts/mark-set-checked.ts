import 'server-only';
import type { CheckResult } from '@/lib/contracts/measurement-check';
import { inTransaction } from '@/lib/server/data/database';
import { moveSet, requireSet } from '@/lib/server/data/measurement-sets';
import { demandLease } from '@/lib/server/jobs/lease';
import type { JobCaller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';

/** Records that a table was read to its end without a fault; its rows follow, all at once. */
export async function markSetChecked(
  caller: JobCaller,
  id: string,
  result: Pick<CheckResult, 'rows' | 'comments' | 'columns'>,
): Promise<void> {
  await inTransaction(async (tx) => {
    const set = await requireSet(dataScope(caller), id, tx);
    await moveSet(tx, set, {
      from: ['received', 'checked'],
      to: 'checked',
      set: {
        n_rows: result.rows,
        comments: result.comments,
        mapping: JSON.stringify(result.columns),
        checked_at: new Date(),
      },
    });
    await demandLease(tx, caller);
  });
}
