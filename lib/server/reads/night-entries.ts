import 'server-only';
import type { Condition } from '@/lib/contracts/api/condition';
import type { Remark } from '@/lib/contracts/api/remark';
import type { TimeLoss } from '@/lib/contracts/api/time-loss';
import type { List, Page } from '@/lib/contracts/common';
import { listConditionRows, toCondition } from '@/lib/server/data/conditions';
import { requireNight } from '@/lib/server/data/nights';
import { listRemarkRows, toRemark } from '@/lib/server/data/remarks';
import { allTimeLossRows, toTimeLoss } from '@/lib/server/data/time-losses';
import type { Caller } from '@/lib/server/policy/caller';
import { nightScope } from '@/lib/server/policy/scope';

/** Conditions of a night, by time. Whoever may see the night may see its sky. */
export async function nightConditions(caller: Caller, id: string, page: Page): Promise<List<Condition>> {
  const night = await requireNight(nightScope(caller), id);
  const { rows, next } = await listConditionRows(night.id, page);
  return { items: rows.map(toCondition), next };
}

/** Remarks of a night, by time. */
export async function nightRemarks(caller: Caller, id: string, page: Page): Promise<List<Remark>> {
  const night = await requireNight(nightScope(caller), id);
  const { rows, next } = await listRemarkRows(night.id, page);
  return { items: rows.map(toRemark), next };
}

/** Time lost in a night, in the order of entry. */
export async function nightTimeLosses(caller: Caller, id: string): Promise<List<TimeLoss>> {
  const night = await requireNight(nightScope(caller), id);
  return { items: (await allTimeLossRows(night.id)).map(toTimeLoss), next: null };
}
