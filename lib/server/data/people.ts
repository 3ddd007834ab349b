import 'server-only';
import type { PersonListed } from '@/lib/contracts/people';
import type { ObservatoryRole, ProgrammeRole } from '@/lib/contracts/roles';
import { execute, insert, select, selectOne, type Tx } from './database';

export interface PersonRow {
  readonly id: number;
  readonly publicId: string;
  readonly email: string;
  readonly name: string;
  readonly passwordHash: string | null;
  readonly light: string;
  readonly disabledAt: Date | null;
}

const columns = `id, public_id AS publicId, email, name, password_hash AS passwordHash, light, disabled_at AS disabledAt`;

export async function personByEmail(email: string, tx: Tx | null = null): Promise<PersonRow | null> {
  return selectOne<PersonRow>(`SELECT ${columns} FROM people WHERE email = :email`, { email }, tx);
}

/** The person's row, held until the transaction ends. */
export async function lockPerson(publicId: string, tx: Tx): Promise<PersonRow | null> {
  return selectOne<PersonRow>(
    `SELECT ${columns} FROM people WHERE public_id = :publicId FOR UPDATE`,
    { publicId },
    tx,
  );
}

export interface NewPerson {
  readonly publicId: string;
  readonly email: string;
  readonly name: string;
}

/** Adds a person; returns null when the address is taken. */
export async function insertPerson(person: NewPerson, tx: Tx): Promise<number | null> {
  const id = await insert(
    'INSERT IGNORE INTO people (public_id, email, name) VALUES (:publicId, :email, :name)',
    { ...person },
    tx,
  );
  return id > 0 ? id : null;
}

export async function setPassword(id: number, hash: string, tx: Tx): Promise<void> {
  await execute('UPDATE people SET password_hash = :hash WHERE id = :id', { id, hash }, tx);
}

export async function setName(id: number, name: string, tx: Tx): Promise<void> {
  await execute('UPDATE people SET name = :name WHERE id = :id', { id, name }, tx);
}

export async function setLight(id: number, light: string, tx: Tx | null): Promise<void> {
  await execute('UPDATE people SET light = :light WHERE id = :id', { id, light }, tx);
}

/** Disables or enables; false when the person is in that state already. */
export async function setDisabled(id: number, isDisabled: boolean, tx: Tx): Promise<boolean> {
  const changed = await execute(
    `UPDATE people SET disabled_at = IF(:isDisabled, NOW(3), NULL)
      WHERE id = :id AND (disabled_at IS NOT NULL) <> :isDisabled`,
    { id, isDisabled },
    tx,
  );
  return changed === 1;
}

export async function rolesOf(id: number, tx: Tx | null = null): Promise<readonly ObservatoryRole[]> {
  const rows = await select<{ role: ObservatoryRole }>(
    'SELECT role FROM person_roles WHERE person_id = :id ORDER BY role',
    { id },
    tx,
  );
  return rows.map(({ role }) => role);
}

export async function setRoles(id: number, roles: readonly ObservatoryRole[], tx: Tx): Promise<void> {
  await execute('DELETE FROM person_roles WHERE person_id = :id', { id }, tx);
  for (const role of roles) {
    await execute('INSERT INTO person_roles (person_id, role) VALUES (:id, :role)', { id, role }, tx);
  }
}

/**
 * Ids of the managers who can act: enabled and with a password. Holds their rows, so that of two who take the other's
 * role at once the second sees what the first did.
 */
export async function lockManagers(tx: Tx): Promise<readonly number[]> {
  // The one row of the observatory stands for the question "who manages it": it serialises the askers.
  await select('SELECT id FROM observatories FOR UPDATE', {}, tx);
  const rows = await select<{ id: number }>(
    `SELECT p.id FROM people p JOIN person_roles r ON r.person_id = p.id AND r.role = 'manager'
      WHERE p.disabled_at IS NULL AND p.password_hash IS NOT NULL ORDER BY p.id FOR UPDATE`,
    {},
    tx,
  );
  return rows.map(({ id }) => id);
}

/** Whether there is a manager who can act: enabled and with a password. */
export async function managerExists(tx: Tx): Promise<boolean> {
  const row = await selectOne(
    `SELECT 1 AS found FROM person_roles r JOIN people p ON p.id = r.person_id
      WHERE r.role = 'manager' AND p.disabled_at IS NULL AND p.password_hash IS NOT NULL LIMIT 1`,
    {},
    tx,
  );
  return row !== null;
}

/** Everybody with an account: roles, programmes, state and last sign-in, by name. */
export async function listPeople(): Promise<readonly PersonListed[]> {
  const [rows, roles, memberships] = await Promise.all([
    select<
      Omit<PersonListed, 'roles' | 'programmes' | 'lastSignIn'> & { id: number; lastSignIn: Date | null }
    >(
      `SELECT p.id, p.public_id AS publicId, p.name, p.email,
              CASE WHEN p.disabled_at IS NOT NULL THEN 'disabled'
                   WHEN p.password_hash IS NULL THEN 'invited' ELSE 'active' END AS state,
              (SELECT MAX(e.utc) FROM audit_events e WHERE e.person_id = p.id AND e.act = 'sign-in') AS lastSignIn
         FROM people p ORDER BY p.name, p.id`,
    ),
    select<{ personId: number; role: ObservatoryRole }>(
      'SELECT person_id AS personId, role FROM person_roles ORDER BY role',
    ),
    select<{ personId: number; code: string; role: ProgrammeRole }>(
      `SELECT m.person_id AS personId, g.code, m.role
         FROM programme_members m JOIN programmes g ON g.id = m.programme_id ORDER BY g.code`,
    ),
  ]);
  return rows.map(({ id, lastSignIn, ...person }) => ({
    ...person,
    lastSignIn: lastSignIn?.toISOString() ?? null,
    roles: roles.filter(({ personId }) => personId === id).map(({ role }) => role),
    programmes: memberships
      .filter(({ personId }) => personId === id)
      .map(({ code, role }) => ({ code, role })),
  }));
}
