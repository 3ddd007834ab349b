import { changeExclusions } from '@/lib/contracts/api/solution';
import { changeExclusions as change } from '@/lib/server/acts/change-exclusions';
import { endpoint } from '@/lib/server/http/endpoint';

export const POST = endpoint(changeExclusions, ({ caller, params, body }) => change(caller, params.id, body));
