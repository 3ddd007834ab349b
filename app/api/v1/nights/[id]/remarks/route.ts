import { addRemark, listRemarks } from '@/lib/contracts/api/remark';
import { addRemark as add } from '@/lib/server/acts/add-remark';
import { endpoint } from '@/lib/server/http/endpoint';
import { nightRemarks } from '@/lib/server/reads/night-entries';

export const GET = endpoint(listRemarks, ({ caller, params, query }) =>
  nightRemarks(caller, params.id, query),
);

export const POST = endpoint(addRemark, ({ caller, params, body }) => add(caller, params.id, body));
