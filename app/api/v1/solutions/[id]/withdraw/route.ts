import { withdrawSolution } from '@/lib/contracts/api/solution';
import { withdrawSolution as withdraw } from '@/lib/server/acts/withdraw-solution';
import { endpoint } from '@/lib/server/http/endpoint';
import { readSolution } from '@/lib/server/reads/solutions';

export const POST = endpoint(withdrawSolution, async ({ caller, params, body }) => {
  await withdraw(caller, params.id, body);
  return readSolution(caller, params.id);
});
