import 'server-only';
import { callerOfPerson, type CallerRow } from '@/lib/server/data/callers';
import { tokenScopes, type PersonCaller, type TokenScope } from '@/lib/server/policy/caller';

interface Entry {
  readonly via: PersonCaller['via'];
  /** What a token may do; all, if not given. */
  readonly scopes?: readonly TokenScope[];
  readonly requestId: string;
}

/** A caller from the person's row. */
export function toCaller(person: CallerRow, entry: Entry): PersonCaller {
  return {
    kind: 'person',
    personId: person.personId,
    publicId: person.publicId,
    name: person.name,
    email: person.email,
    roles: new Set(person.roles),
    programmes: new Map(person.programmes),
    via: entry.via,
    scopes: new Set(entry.scopes ?? tokenScopes),
    requestId: entry.requestId,
  };
}

/** The caller for a person's id, or null when there is no such person or the person is disabled. */
export async function callerOf(personId: number, entry: Entry): Promise<PersonCaller | null> {
  const person = await callerOfPerson(personId);
  return person && toCaller(person, entry);
}
