import { getSolution } from '@/lib/contracts/api/solution';
import { endpoint } from '@/lib/server/http/endpoint';
import { readSolution } from '@/lib/server/reads/solutions';

export const GET = endpoint(getSolution, ({ caller, params }) => readSolution(caller, params.id));
