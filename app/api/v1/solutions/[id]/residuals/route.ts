import { listResiduals } from '@/lib/contracts/api/solution';
import { endpoint } from '@/lib/server/http/endpoint';
import { solutionResiduals } from '@/lib/server/reads/solutions';

export const GET = endpoint(listResiduals, ({ caller, params, query }) =>
  solutionResiduals(caller, params.id, query),
);
