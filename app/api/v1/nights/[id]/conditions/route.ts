import { addConditions, listConditions } from '@/lib/contracts/api/condition';
import { addConditions as add } from '@/lib/server/acts/add-conditions';
import { endpoint } from '@/lib/server/http/endpoint';
import { nightConditions } from '@/lib/server/reads/night-entries';

export const GET = endpoint(listConditions, ({ caller, params, query }) =>
  nightConditions(caller, params.id, query),
);

export const POST = endpoint(addConditions, async ({ caller, params, body }) => {
  const isList = Array.isArray(body);
  const entries = await add(caller, params.id, isList ? body : [body], isList);
  const [first] = entries;
  return isList || !first ? { items: entries, next: null } : first;
});
