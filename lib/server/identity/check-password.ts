import 'server-only';
import { durationWords } from '@/lib/contracts/duration-words';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { personByEmail, type PersonRow } from '@/lib/server/data/people';
import { forgiveTry, reserveTry } from '@/lib/server/data/sign-in-failures';
import type { Visitor } from '@/lib/server/policy/caller';
import { passwordMatches } from './password';
import { secretHash } from './secrets';

/** Failures that cost no wait. Many people may share a network address, so it gets more of them. */
const freeByAccount = 3;
const freeByAddress = 20;

export interface Credentials {
  readonly email: string;
  readonly password: string;
}

/**
 * The enabled person whom e-mail address and password belong to. Failures slow down further tries by account and by
 * network address; whether an account exists shows neither in the answer nor in its time.
 */
export async function checkPassword(visitor: Visitor, { email, password }: Credentials): Promise<PersonRow> {
  const account = secretHash(`account:${email}`);
  const address = secretHash(`address:${visitor.address}`);
  const reserved = await reserveTry([
    { subject: account, free: freeByAccount },
    { subject: address, free: freeByAddress },
  ]);
  if (reserved.wait_s > 0) {
    const wait = durationWords(reserved.wait_s);
    throw new Fault('too-many', `There were too many failed sign-ins. The next try is possible in ${wait}.`, {
      retryAfter_s: reserved.wait_s,
    });
  }
  const person = await personByEmail(email);
  if (!(await passwordMatches(person?.passwordHash ?? null, password)) || !person) {
    await recordFailure(visitor, { email, person, why: 'wrong password or address' });
    const wait =
      reserved.waitAfter_s > 0 ? ` Wait ${durationWords(reserved.waitAfter_s)} before the next try.` : '';
    throw new Fault('not-signed-in', `The e-mail address or the password is wrong.${wait}`);
  }
  await forgiveTry(account, address);
  if (person.disabledAt) {
    await recordFailure(visitor, { email, person, why: 'account is disabled' });
    throw new Fault('not-allowed', 'This account is disabled. A manager of the observatory can enable it.');
  }
  return person;
}

interface Failure {
  readonly email: string;
  readonly person: PersonRow | null;
  readonly why: string;
}

async function recordFailure(visitor: Visitor, { email, person, why }: Failure): Promise<void> {
  const actor = { personId: null, requestId: visitor.requestId };
  await inTransaction((tx) =>
    recordAudit(tx, actor, {
      act: 'sign-in.fail',
      subjectKind: 'person',
      subjectId: person?.publicId ?? 'unknown',
      reason: why,
      after: { email, address: visitor.address },
    }),
  );
}
