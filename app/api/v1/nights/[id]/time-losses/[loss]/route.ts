import { correctTimeLoss, removeTimeLoss } from '@/lib/contracts/api/time-loss';
import { correctTimeLoss as correct } from '@/lib/server/acts/correct-time-loss';
import { removeTimeLoss as remove } from '@/lib/server/acts/remove-time-loss';
import { endpoint } from '@/lib/server/http/endpoint';

export const PATCH = endpoint(correctTimeLoss, ({ caller, params, body }) =>
  correct(caller, { night: params.id, loss: params.loss }, body),
);

export const DELETE = endpoint(removeTimeLoss, async ({ caller, params, query }) => {
  await remove(caller, { night: params.id, loss: params.loss }, query.reason);
  return undefined;
});
