import { createConnection } from 'mariadb';
import type { DatabaseAddress } from '@/db/connection';

export interface ClaimedDatabase {
  readonly address: DatabaseAddress;
  readonly release: () => Promise<void>;
}

/** Name of the lock that whoever uses a worker's database holds. */
export const lockOf = (address: DatabaseAddress): string => `${address.database} is in use`;

/**
 * Takes one of the databases for this test file alone, by a lock in MariaDB that ends with the process at the latest.
 * Vitest's own numbers for its workers would not do: where one group of projects follows another, two can have the same.
 */
export async function claimDatabase(addresses: readonly DatabaseAddress[]): Promise<ClaimedDatabase> {
  const [first] = addresses;
  if (first === undefined) throw new Error('There is no database to claim.');
  const { host, port, user, password } = first;
  const connection = await createConnection({ host, port, user, password });
  for (const deadline = Date.now() + 60_000; Date.now() < deadline;) {
    for (const address of addresses) {
      const [row]: readonly { got: bigint }[] = await connection.query('SELECT GET_LOCK(?, 0) AS got', [
        lockOf(address),
      ]);
      if (Number(row?.got) === 1) return { address, release: () => connection.end() };
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error('Every database of the integration tests stayed in use for a minute.');
}
