import 'server-only';
import { pino, type Logger } from 'pino';

const holder = globalThis as typeof globalThis & { evenfallLogger?: Logger };

/** Structured log of this process, one JSON object a line on standard output. */
export function logger(): Logger {
  holder.evenfallLogger ??= pino({
    level: process.env['LOG_LEVEL'] ?? 'info',
    base: { pid: process.pid },
    timestamp: pino.stdTimeFunctions.isoTime,
    redact: ['password', 'token', '*.password', '*.token', '*.authorization', '*.cookie'],
  });
  return holder.evenfallLogger;
}
