import { listProgrammes } from '@/lib/contracts/api/programme';
import { endpoint } from '@/lib/server/http/endpoint';
import { readProgrammes } from '@/lib/server/reads/programmes';

export const GET = endpoint(listProgrammes, ({ caller, query }) => readProgrammes(caller, query));
