import { listObjects } from '@/lib/contracts/api/object-name';
import { endpoint } from '@/lib/server/http/endpoint';
import { objectNames } from '@/lib/server/reads/object-names';

export const GET = endpoint(listObjects, ({ caller, query }) => objectNames(caller, query));
