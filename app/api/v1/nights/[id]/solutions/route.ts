import { listSolutions, solveNight } from '@/lib/contracts/api/solution';
import { queueSolve } from '@/lib/server/acts/queue-solve';
import { endpoint } from '@/lib/server/http/endpoint';
import { nightSolutions } from '@/lib/server/reads/solutions';

export const GET = endpoint(listSolutions, ({ caller, params, query }) =>
  nightSolutions(caller, params.id, query),
);

export const POST = endpoint(solveNight, ({ caller, params, body }) => queueSolve(caller, params.id, body));
