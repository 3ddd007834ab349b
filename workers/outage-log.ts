import { logger } from '@/lib/server/log/logger';

/** Says once that something cannot be reached, and once that it is back, however often it is tried between. */
export function outageLog(what: string): {
  readonly failed: (error: unknown) => void;
  readonly worked: () => void;
} {
  let since_ms: number | null = null;
  return {
    failed: (error) => {
      if (since_ms === null)
        logger().warn({ err: error }, `${what}: not reachable; trying again until it is`);
      since_ms ??= Date.now();
    },
    worked: () => {
      if (since_ms !== null)
        logger().info({ after_s: Math.round((Date.now() - since_ms) / 1000) }, `${what}: back`);
      since_ms = null;
    },
  };
}
