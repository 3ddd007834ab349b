import { approveSolution } from '@/lib/contracts/api/solution';
import { approveSolution as approve } from '@/lib/server/acts/approve-solution';
import { endpoint } from '@/lib/server/http/endpoint';
import { readSolution } from '@/lib/server/reads/solutions';

export const POST = endpoint(approveSolution, async ({ caller, params, body }) => {
  await approve(caller, params.id, body);
  return readSolution(caller, params.id);
});
