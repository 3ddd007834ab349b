import { leaveDatabase } from '@/lib/server/jobs/leave-database';
import { environment } from '@/lib/server/settings/environment';
import { announceStop } from '@/lib/server/settings/shutdown';
import { handlers } from './handlers';
import { startRunner, type Runner } from './runner';
import { stopOnSignal } from './stop-on-signal';

/** On globalThis: a development server loads this module again, but the process goes on. */
const holder = globalThis as typeof globalThis & { evenfallInServer?: { readonly runner: Runner | null } };

/**
 * What runs in the server's process beside the pages: the runner, unless WORKER_IN_SERVER=0, and an orderly stop where the
 * start script has told Next to leave the signals to us. Called once, by instrumentation.ts.
 */
export function startInServer(): void {
  if (holder.evenfallInServer) return;
  const { workerInServer, workerConcurrency } = environment();
  const runner = workerInServer ? startRunner({ handlers, concurrency: workerConcurrency }) : null;
  holder.evenfallInServer = { runner };
  if (process.env['NEXT_MANUAL_SIG_HANDLE'] !== '1') return;
  stopOnSignal(async () => {
    announceStop();
    await runner?.stop();
    await leaveDatabase();
  });
}
