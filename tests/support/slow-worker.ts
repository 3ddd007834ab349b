import { leaveDatabase } from '@/lib/server/jobs/leave-database';
import { startRunner } from '@/workers/runner';
import { stopOnSignal } from '@/workers/stop-on-signal';

// A worker process for tests that end it: its jobs take as long as SLOW_MS says, and its leases are short.
const slow_ms = Number(process.env['SLOW_MS']);
const runner = startRunner({
  concurrency: 1,
  poll_ms: 50,
  lease_s: Number(process.env['LEASE_S']),
  handlers: {
    'check-measurements': () =>
      Promise.resolve(({ payload, progress, signal }) => {
        progress(0.5, `process ${process.pid}`);
        return new Promise((resolve, reject) => {
          const timer = setTimeout(
            () => resolve({ set: payload.set, state: 'matched', rows: process.pid, matched: 0, faults: 0 }),
            slow_ms,
          );
          signal.addEventListener('abort', () => {
            clearTimeout(timer);
            reject(signal.reason as Error);
          });
        });
      }),
  },
});
stopOnSignal(async () => {
  await runner.stop(200);
  await leaveDatabase();
});
