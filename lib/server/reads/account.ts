import 'server-only';
import { tokensOfPerson, type TokenRow } from '@/lib/server/data/api-tokens';
import { programmeCodes } from '@/lib/server/data/programmes';
import { sessionsOfPerson } from '@/lib/server/data/sessions';
import { secretHash } from '@/lib/server/identity/secrets';
import type { ObservatoryRole, ProgrammeRole } from '@/lib/contracts/roles';
import type { PersonCaller } from '@/lib/server/policy/caller';

export interface AccountSession {
  /** The beginning of its hash: enough to name it, useless to enter by. */
  readonly session: string;
  readonly userAgent: string;
  readonly createdAt: string;
  readonly expiresAt: string;
  readonly isThis: boolean;
}

export interface Account {
  readonly name: string;
  readonly email: string;
  readonly roles: readonly ObservatoryRole[];
  readonly programmes: readonly {
    readonly code: string;
    readonly title: string;
    readonly role: ProgrammeRole;
  }[];
  readonly tokens: readonly TokenRow[];
  readonly sessions: readonly AccountSession[];
}

/** What a person sees of the own account. */
export async function account(
  caller: PersonCaller,
  { cookie }: { readonly cookie: string | null },
): Promise<Account> {
  const [tokens, sessions, programmes] = await Promise.all([
    tokensOfPerson(caller.personId),
    sessionsOfPerson(caller.personId),
    ownProgrammes(caller),
  ]);
  const own = cookie === null ? null : secretHash(cookie);
  return {
    name: caller.name,
    email: caller.email,
    roles: [...caller.roles],
    programmes,
    tokens,
    sessions: sessions.map((row) => ({
      session: row.hash.slice(0, 16),
      userAgent: row.userAgent,
      createdAt: row.createdAt.toISOString(),
      expiresAt: row.expiresAt.toISOString(),
      isThis: row.hash === own,
    })),
  };
}

/** The caller's programmes by code, with the role in each. */
export async function ownProgrammes(caller: PersonCaller): Promise<Account['programmes']> {
  const codes = await programmeCodes([...caller.programmes.keys()]);
  return [...codes].flatMap(([id, { code, title }]) => {
    const role = caller.programmes.get(id);
    return role === undefined ? [] : [{ code, title, role }];
  });
}
