import { logger } from '@/lib/server/log/logger';

/** On SIGTERM or SIGINT stops in order and ends the process; a second signal ends it at once. */
export function stopOnSignal(stop: () => Promise<void>): void {
  let isStopping = false;
  const onSignal = (signal: NodeJS.Signals): void => {
    if (isStopping) process.exit(1);
    isStopping = true;
    logger().info({ signal }, 'stopping');
    stop()
      .catch((error: unknown) => {
        // What could not be stopped in order ends with the process; leases run out.
        logger().error({ err: error }, 'stopping did not go well');
        process.exitCode = 1;
      })
      .finally(() => process.exit());
  };
  process.on('SIGTERM', onSignal);
  process.on('SIGINT', onSignal);
}
