import type { Transaction } from 'sequelize';
import { newPublicId } from '@/lib/server/data/public-id';
import { hashPassword, passwordMatches } from '@/lib/server/identity/password';
import { Person } from '../../models/person';
import { PersonRole } from '../../models/person-role';
import type { DemoObservatory } from './demo-world';

/** Internal ids of the demo's people. */
export interface PersonIds {
  /** Throws for somebody who is not in the demo. */
  readonly byEmail: (email: string) => number;
}

/** Adds the demo's people, all with one password. */
export async function loadPeople(
  people: DemoObservatory['people'],
  password: string,
  transaction: Transaction,
): Promise<PersonIds> {
  const ids = new Map<string, number>();
  for (const { email, name, roles } of people) {
    const passwordHash = await hashPassword(password);
    const person = await Person.create(
      { publicId: newPublicId(), email, name, passwordHash },
      { transaction },
    );
    ids.set(email, person.id);
    await PersonRole.bulkCreate(
      roles.map((role) => ({ personId: person.id, role })),
      { transaction },
    );
  }
  return {
    byEmail: (email) => {
      const id = ids.get(email);
      if (id === undefined) throw new Error(`${email} is not among the people of the demo.`);
      return id;
    },
  };
}

/**
 * Gives the demo's people the password that the start script prints, where they have another: the demo may have been
 * loaded with a different DEMO_PASSWORD. Returns how many were changed.
 */
export async function refreshPasswords(
  people: DemoObservatory['people'],
  password: string,
  transaction: Transaction,
): Promise<number> {
  let changed = 0;
  for (const { email } of people) {
    const person = await Person.findOne({ where: { email }, transaction });
    if (person === null || (await passwordMatches(person.passwordHash, password))) continue;
    await person.update({ passwordHash: await hashPassword(password) }, { transaction });
    changed += 1;
  }
  return changed;
}
