import { correctCondition, removeCondition } from '@/lib/contracts/api/condition';
import { correctCondition as correct } from '@/lib/server/acts/correct-condition';
import { removeCondition as remove } from '@/lib/server/acts/remove-condition';
import { endpoint } from '@/lib/server/http/endpoint';

export const PATCH = endpoint(correctCondition, ({ caller, params, body }) =>
  correct(caller, { night: params.id, condition: params.condition }, body),
);

export const DELETE = endpoint(removeCondition, async ({ caller, params, query }) => {
  await remove(caller, { night: params.id, condition: params.condition }, query.reason);
  return undefined;
});
