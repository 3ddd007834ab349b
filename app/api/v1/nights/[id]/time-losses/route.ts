import { addTimeLoss, listTimeLosses } from '@/lib/contracts/api/time-loss';
import { addTimeLoss as add } from '@/lib/server/acts/add-time-loss';
import { endpoint } from '@/lib/server/http/endpoint';
import { nightTimeLosses } from '@/lib/server/reads/night-entries';

export const GET = endpoint(listTimeLosses, ({ caller, params }) => nightTimeLosses(caller, params.id));

export const POST = endpoint(addTimeLoss, ({ caller, params, body }) => add(caller, params.id, body));
