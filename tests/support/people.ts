import type { ObservatoryRole, ProgrammeRole } from '@/lib/contracts/roles';
import { execute, insert } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import { callerOf } from '@/lib/server/identity/caller';
import { hashPassword } from '@/lib/server/identity/password';
import type { PersonCaller, Visitor } from '@/lib/server/policy/caller';

export interface TestPerson {
  readonly id: number;
  readonly publicId: string;
  readonly email: string;
}

interface Wanted {
  readonly roles?: readonly ObservatoryRole[];
  /** Programme's internal id to the role in it. */
  readonly programmes?: Readonly<Record<number, ProgrammeRole>>;
  /** Without one the person is still invited. */
  readonly password?: string;
}

export const testPassword = 'a long test password';
let hashed: Promise<string> | undefined;
let count = 0;

/** A person in the database, with a password unless it is left out by `password: ''`. */
export async function newPerson(wanted: Wanted = {}): Promise<TestPerson> {
  count += 1;
  const publicId = newPublicId();
  const email = `person${count}-${publicId}@evenfall.example`;
  hashed ??= hashPassword(testPassword);
  const passwordHash =
    wanted.password === undefined
      ? await hashed
      : wanted.password === ''
        ? null
        : await hashPassword(wanted.password);
  const id = await insert(
    'INSERT INTO people (public_id, email, name, password_hash) VALUES (:publicId, :email, :name, :passwordHash)',
    { publicId, email, name: `Person ${count}`, passwordHash },
    null,
  );
  for (const role of wanted.roles ?? []) {
    await execute('INSERT INTO person_roles (person_id, role) VALUES (:id, :role)', { id, role }, null);
  }
  for (const [programme, role] of Object.entries(wanted.programmes ?? {})) {
    await execute(
      'INSERT INTO programme_members (programme_id, person_id, role) VALUES (:programme, :id, :role)',
      { programme: Number(programme), id, role },
      null,
    );
  }
  return { id, publicId, email };
}

/** The person as a signed-in caller. */
export async function callerFor(person: TestPerson): Promise<PersonCaller> {
  const caller = await callerOf(person.id, { via: 'session', requestId: `test-${person.publicId}` });
  if (!caller) throw new Error(`${person.email} cannot come in.`);
  return caller;
}

/** A new person as a signed-in caller. */
export async function newCaller(wanted: Wanted = {}): Promise<PersonCaller> {
  return callerFor(await newPerson(wanted));
}

/** Somebody at the door. Each has an address of its own unless one is given. */
export function newVisitor(address = `192.0.2.${(count += 1)}`): Visitor {
  return { requestId: 'test', address, userAgent: 'Mozilla/5.0 (X11; Linux x86_64) Firefox/140.0' };
}

export async function newObservatory(): Promise<number> {
  return insert("INSERT INTO observatories (name, settings) VALUES (:name, '{}')", { name: 'Test' }, null);
}

export async function newProgramme(code: string): Promise<number> {
  return insert(
    "INSERT INTO programmes (public_id, code, title, summary) VALUES (:publicId, :code, :code, '')",
    { publicId: newPublicId(), code },
    null,
  );
}
