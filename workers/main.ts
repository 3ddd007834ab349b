import { leaveDatabase } from '@/lib/server/jobs/leave-database';
import { environment } from '@/lib/server/settings/environment';
import { handlers } from './handlers';
import { startRunner } from './runner';
import { stopOnSignal } from './stop-on-signal';

// A process that does nothing but jobs, beside the server or instead of the server's own runner; any number of them.
const runner = startRunner({ handlers, concurrency: environment().workerConcurrency });
stopOnSignal(async () => {
  await runner.stop();
  await leaveDatabase();
});
