import { correctRemark, removeRemark } from '@/lib/contracts/api/remark';
import { correctRemark as correct } from '@/lib/server/acts/correct-remark';
import { removeRemark as remove } from '@/lib/server/acts/remove-remark';
import { endpoint } from '@/lib/server/http/endpoint';

export const PATCH = endpoint(correctRemark, ({ caller, params, body }) =>
  correct(caller, { night: params.id, remark: params.remark }, body),
);

export const DELETE = endpoint(removeRemark, async ({ caller, params, query }) => {
  await remove(caller, { night: params.id, remark: params.remark }, query.reason);
  return undefined;
});
