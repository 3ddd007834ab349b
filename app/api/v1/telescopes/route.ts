import { listTelescopes } from '@/lib/contracts/api/telescope';
import { endpoint } from '@/lib/server/http/endpoint';
import { readTelescopes } from '@/lib/server/reads/telescopes';

export const GET = endpoint(listTelescopes, ({ caller, query }) => readTelescopes(caller, query));
