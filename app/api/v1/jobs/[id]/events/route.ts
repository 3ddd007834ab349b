import { getJobEvents } from '@/lib/contracts/api/job';
import { endpoint } from '@/lib/server/http/endpoint';
import { eventStream } from '@/lib/server/http/event-stream';
import { followJob } from '@/lib/server/reads/follow-job';

export const GET = endpoint(getJobEvents, ({ caller, params, request }) =>
  eventStream(request, (signal) => followJob(caller, params.id, signal)),
);
