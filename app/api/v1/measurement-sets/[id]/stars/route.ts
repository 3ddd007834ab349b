import { listMeasuredStars } from '@/lib/contracts/api/measurement-set';
import { endpoint } from '@/lib/server/http/endpoint';
import { measuredStars } from '@/lib/server/reads/measurement-contents';

export const GET = endpoint(listMeasuredStars, ({ caller, params, query }) =>
  measuredStars(caller, params.id, query),
);
