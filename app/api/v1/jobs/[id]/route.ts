import { getJob } from '@/lib/contracts/api/job';
import { endpoint } from '@/lib/server/http/endpoint';
import { readJob } from '@/lib/server/reads/job';

export const GET = endpoint(getJob, ({ caller, params }) => readJob(caller, params.id));
