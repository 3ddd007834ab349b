import { proposeSolution } from '@/lib/contracts/api/solution';
import { proposeSolution as propose } from '@/lib/server/acts/propose-solution';
import { endpoint } from '@/lib/server/http/endpoint';
import { readSolution } from '@/lib/server/reads/solutions';

export const POST = endpoint(proposeSolution, async ({ caller, params, body }) => {
  await propose(caller, params.id, body);
  return readSolution(caller, params.id);
});
