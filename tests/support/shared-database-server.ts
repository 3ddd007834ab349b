import { startDatabaseServer, type DatabaseServer } from './database-server';

/**
 * One MariaDB for a whole run of vitest: each project's global setup runs anew, all of them in one process, so the
 * server and the number of its users are kept on globalThis.
 */
const holder = globalThis as typeof globalThis & {
  evenfallTestServer?: { readonly server: Promise<DatabaseServer>; users: number };
};

export async function takeDatabaseServer(): Promise<DatabaseServer> {
  holder.evenfallTestServer ??= { server: startDatabaseServer(), users: 0 };
  holder.evenfallTestServer.users += 1;
  return holder.evenfallTestServer.server;
}

/** Gives the server back; the last user's return stops it. */
export async function returnDatabaseServer(): Promise<void> {
  const held = holder.evenfallTestServer;
  if (held === undefined) return;
  held.users -= 1;
  if (held.users > 0) return;
  delete holder.evenfallTestServer;
  await (await held.server).dispose();
}
