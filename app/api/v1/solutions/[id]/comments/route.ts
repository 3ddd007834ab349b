import { addSolutionComment, listSolutionComments } from '@/lib/contracts/api/solution';
import { addSolutionComment as add } from '@/lib/server/acts/add-solution-comment';
import { endpoint } from '@/lib/server/http/endpoint';
import { solutionComments } from '@/lib/server/reads/solutions';

export const GET = endpoint(listSolutionComments, ({ caller, params }) =>
  solutionComments(caller, params.id),
);

export const POST = endpoint(addSolutionComment, ({ caller, params, body }) => add(caller, params.id, body));
