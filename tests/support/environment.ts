import type { DatabaseAddress } from '@/db/connection';

/** The environment variables that say where the database is. */
export function databaseEnvironment(address: DatabaseAddress): Record<string, string> {
  return {
    DB_HOST: address.host,
    DB_PORT: String(address.port),
    DB_USER: address.user,
    DB_PASSWORD: address.password,
    DB_NAME: address.database,
    DB_CONNECTIONS: String(address.connections),
  };
}
