import { retryJob } from '@/lib/contracts/api/job';
import { retryJob as retry } from '@/lib/server/acts/retry-job';
import { endpoint } from '@/lib/server/http/endpoint';
import { readJob } from '@/lib/server/reads/job';

export const POST = endpoint(retryJob, async ({ caller, params }) => {
  await retry(caller, params.id);
  return readJob(caller, params.id);
});
