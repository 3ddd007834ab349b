import { cancelJob } from '@/lib/contracts/api/job';
import { cancelJob as cancel } from '@/lib/server/acts/cancel-job';
import { endpoint } from '@/lib/server/http/endpoint';
import { readJob } from '@/lib/server/reads/job';

export const POST = endpoint(cancelJob, async ({ caller, params }) => {
  await cancel(caller, params.id);
  return readJob(caller, params.id);
});
