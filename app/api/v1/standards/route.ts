import { listStandards } from '@/lib/contracts/api/standard';
import { endpoint } from '@/lib/server/http/endpoint';
import { listStandards as list } from '@/lib/server/reads/list-standards';

export const GET = endpoint(listStandards, ({ caller, query }) => list(caller, query));
