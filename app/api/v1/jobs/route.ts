import { listJobs } from '@/lib/contracts/api/job';
import { endpoint } from '@/lib/server/http/endpoint';
import { readJobs } from '@/lib/server/reads/jobs';

export const GET = endpoint(listJobs, ({ caller, query }) => readJobs(caller, query));
