import { describe, expect, it } from 'vitest';
import { makeTokenByPassword } from '@/lib/server/acts/make-token-by-password';
import { signIn } from '@/lib/server/acts/sign-in';
import { execute, select } from '@/lib/server/data/database';
import { secretHash } from '@/lib/server/identity/secrets';
import { newPerson, newVisitor, testPassword, type TestPerson } from '@/tests/support/people';

const wrong = (person: { email: string }) => ({ email: person.email, password: 'not the password' });
const right = (person: TestPerson) => ({ email: person.email, password: testPassword });
const fails = async (work: Promise<unknown>) =>
  work.then(
    () => null,
    (error: unknown) => error as { code: string; message: string; retryAfter_s?: number },
  );
const auditOf = (person: TestPerson) =>
  select<{ act: string; after: Record<string, unknown> | null }>(
    'SELECT act, after_values AS `after` FROM audit_events WHERE subject_id = :id ORDER BY id',
    { id: person.publicId },
  );
const letPass = (subject: string) =>
  execute(
    'UPDATE sign_in_failures SET next_try_at = NOW(3) WHERE subject = :subject',
    { subject: secretHash(subject) },
    null,
  );

describe('sign-in', () => {
  it('leaves an audit row for success and for failure', async () => {
    const person = await newPerson();
    const visitor = newVisitor();
    await fails(signIn(visitor, wrong(person)));
    await signIn(visitor, right(person));
    const rows = await auditOf(person);
    expect(rows.map(({ act }) => act)).toEqual(['sign-in.fail', 'sign-in']);
    expect(rows[0]?.after).toEqual({ email: person.email, address: visitor.address });
  });

  it('says the same of an unknown account as of a wrong password', async () => {
    const known = await fails(signIn(newVisitor(), wrong(await newPerson())));
    const unknown = await fails(signIn(newVisitor(), wrong({ email: 'nobody@evenfall.example' })));
    expect(known).toMatchObject({ code: 'not-signed-in' });
    expect(unknown?.message).toBe(known?.message);
  });

  it('takes as long for an unknown account, or one without a password, as for a wrong password', async () => {
    const time_ms = async (email: string): Promise<number> => {
      const start = performance.now();
      await fails(signIn(newVisitor(), wrong({ email })));
      return performance.now() - start;
    };
    let [known, unknown, invited] = [Infinity, Infinity, Infinity];
    // In turns, and the shortest of each: what else the machine does then slows none of the three alone.
    for (let round = 0; round < 6; round += 1) {
      known = Math.min(known, await time_ms((await newPerson()).email));
      unknown = Math.min(unknown, await time_ms(`nobody-${round}@evenfall.example`));
      invited = Math.min(invited, await time_ms((await newPerson({ password: '' })).email));
    }
    expect(unknown).toBeGreaterThan(known * 0.5);
    expect(invited).toBeGreaterThan(known * 0.5);
  });

  it('is slowed from the fourth failure on, twice as long each time, and says how long', async () => {
    const person = await newPerson();
    for (let i = 0; i < 3; i++) {
      expect(await fails(signIn(newVisitor(), wrong(person)))).toMatchObject({ code: 'not-signed-in' });
    }
    const fourth = await fails(signIn(newVisitor(), wrong(person)));
    expect(fourth?.message).toContain('Wait 4 seconds');
    const early = await fails(signIn(newVisitor(), right(person)));
    expect(early?.code).toBe('too-many');
    expect(early?.message).toMatch(/next try is possible in \d seconds/);
    expect(early?.retryAfter_s).toBeGreaterThan(2);
    await letPass(`account:${person.email}`);
    expect((await fails(signIn(newVisitor(), wrong(person))))?.message).toContain('Wait 8 seconds');
  });

  it('starts anew after a success', async () => {
    const person = await newPerson();
    for (let i = 0; i < 3; i++) await fails(signIn(newVisitor(), wrong(person)));
    await signIn(newVisitor(), right(person));
    for (let i = 0; i < 3; i++) {
      expect((await fails(signIn(newVisitor(), wrong(person))))?.message).not.toContain('Wait');
    }
  });

  it('is slowed by network address too, whichever accounts are tried', async () => {
    const address = '198.51.100.7';
    for (let i = 0; i < 21; i++)
      await fails(signIn(newVisitor(address), wrong({ email: `a${i}@evenfall.example` })));
    const person = await newPerson();
    expect(await fails(signIn(newVisitor(address), right(person)))).toMatchObject({ code: 'too-many' });
    await expect(signIn(newVisitor(), right(person))).resolves.toBeDefined();
  });

  it('gives a burst of tries at once no more guesses than one after the other', async () => {
    const person = await newPerson();
    const burst = await Promise.all(
      Array.from({ length: 12 }, () => fails(signIn(newVisitor(), wrong(person)))),
    );
    expect(burst.filter((fault) => fault?.code === 'not-signed-in').length).toBeLessThanOrEqual(4);
  });

  it('refuses a disabled account, which only the right password is told', async () => {
    const person = await newPerson();
    await execute('UPDATE people SET disabled_at = NOW(3) WHERE id = :id', { id: person.id }, null);
    expect(await fails(signIn(newVisitor(), wrong(person)))).toMatchObject({ code: 'not-signed-in' });
    expect(await fails(signIn(newVisitor(), right(person)))).toMatchObject({ code: 'not-allowed' });
  });

  it('makes an API token by password under the same slowing', async () => {
    const person = await newPerson();
    const wanted = { name: 'script', scopes: ['read'] as const };
    const { token } = await makeTokenByPassword(newVisitor(), { ...right(person), ...wanted });
    expect(token).toMatch(/^evf_/);
    for (let i = 0; i < 4; i++)
      await fails(makeTokenByPassword(newVisitor(), { ...wrong(person), ...wanted }));
    expect(await fails(makeTokenByPassword(newVisitor(), { ...right(person), ...wanted }))).toMatchObject({
      code: 'too-many',
    });
  });
});
