import 'server-only';
import { ConnectionError, DatabaseError } from 'sequelize';

const lostConnection = new Set([
  'ER_SOCKET_UNEXPECTED_CLOSE',
  'ER_CMD_CONNECTION_CLOSED',
  'ER_CONNECTION_TIMEOUT',
  'ER_SERVER_SHUTDOWN',
  'ER_CONNECTION_KILLED',
  'ECONNREFUSED',
  'ECONNRESET',
]);

/** Whether an error says that the database cannot be reached just now, rather than that a statement was wrong. */
export function isOutage(error: unknown): boolean {
  if (error instanceof ConnectionError) return true;
  if (!(error instanceof DatabaseError)) return false;
  const code = (error.parent as { code?: unknown }).code;
  return typeof code === 'string' && lostConnection.has(code);
}
