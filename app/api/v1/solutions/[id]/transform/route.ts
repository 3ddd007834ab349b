import { transformAgain } from '@/lib/contracts/api/solution';
import { transformAgain as transform } from '@/lib/server/acts/transform-again';
import { endpoint } from '@/lib/server/http/endpoint';

export const POST = endpoint(transformAgain, ({ caller, params }) => transform(caller, params.id));
