import { describe, expect, inject, it } from 'vitest';
import { QueryTypes } from 'sequelize';
import { addressFromEnvironment, database } from '@/db/connection';
import { claimDatabase, lockOf } from '@/tests/support/claim-database';
import { emptyTables } from '@/tests/support/database';

const count = async (sql: string): Promise<number> => {
  const [row] = await database().query<{ n: number }>(sql, { type: QueryTypes.SELECT });
  return Number(row?.n);
};

describe('the database of a test', () => {
  it('belongs to this test file alone', async () => {
    const address = addressFromEnvironment();
    expect(await count(`SELECT IS_USED_LOCK('${lockOf(address)}') IS NOT NULL AS n`)).toBe(1);
    const others = inject('workerDatabases').filter(({ database: name }) => name !== address.database);
    const claimed = await claimDatabase(others);
    expect(claimed.address.database).not.toBe(address.database);
    await claimed.release();
  });

  it('has the foreign keys and checks of the migrations', async () => {
    const constraints = (type: string): Promise<number> =>
      count(
        `SELECT COUNT(*) AS n FROM information_schema.table_constraints
          WHERE constraint_schema = DATABASE() AND constraint_type = '${type}'`,
      );
    expect(await constraints('FOREIGN KEY')).toBeGreaterThan(30);
    expect(await constraints('CHECK')).toBeGreaterThan(10);
  });

  it('is empty again after emptyTables, whatever refers to what', async () => {
    await database().query(
      "INSERT INTO people (public_id, email, name) VALUES ('aaaaaaaaaaaa', 'a@b.example', 'A')",
    );
    await database().query(
      "INSERT INTO person_roles (person_id, role) SELECT id, 'observer' FROM people WHERE public_id = 'aaaaaaaaaaaa'",
    );
    await emptyTables();
    expect(await count('SELECT COUNT(*) AS n FROM people')).toBe(0);
    expect(await count('SELECT COUNT(*) AS n FROM person_roles')).toBe(0);
  });
});
