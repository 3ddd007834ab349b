import { beforeEach, describe, expect, it } from 'vitest';
import { acceptLink } from '@/lib/server/acts/accept-link';
import { changePerson } from '@/lib/server/acts/change-person';
import { changeOwnPassword } from '@/lib/server/acts/change-own-password';
import { disablePerson } from '@/lib/server/acts/disable-person';
import { enablePerson } from '@/lib/server/acts/enable-person';
import { inviteFirstManager } from '@/lib/server/acts/invite-first-manager';
import { invitePerson } from '@/lib/server/acts/invite-person';
import { makePersonLink } from '@/lib/server/acts/make-person-link';
import { makeToken } from '@/lib/server/acts/make-token';
import { signIn } from '@/lib/server/acts/sign-in';
import { execute, inTransaction, select } from '@/lib/server/data/database';
import { rolesOf } from '@/lib/server/data/people';
import { personOfSession } from '@/lib/server/identity/sessions';
import { personOfToken } from '@/lib/server/identity/tokens';
import type { JobCaller } from '@/lib/server/policy/caller';
import { emptyTables } from '@/tests/support/database';
import {
  callerFor,
  newCaller,
  newObservatory,
  newPerson,
  newVisitor,
  testPassword,
  type TestPerson,
} from '@/tests/support/people';

const tokenIn = (link: string): string => link.split('/').at(-1) ?? '';
const accept = (link: string, password = 'seven clear nights in May', repeated = password) =>
  acceptLink(newVisitor(), { token: tokenIn(link), password, repeated });
const fault = (code: string) => ({ name: 'Fault', code });

beforeEach(async () => {
  await emptyTables();
  await newObservatory();
});

describe('a one-time link', () => {
  const invite = async () => {
    const manager = await newCaller({ roles: ['manager'] });
    return invitePerson(manager, {
      email: 'noor@evenfall.example',
      name: 'Noor Hathaway',
      roles: ['observer'],
    });
  };

  it('sets the password and signs in, with the roles that were given', async () => {
    const { person, link } = await invite();
    const { cookie } = await accept(link);
    expect(await personOfSession(cookie)).toMatchObject({ publicId: person, roles: ['observer'] });
    await expect(
      signIn(newVisitor(), { email: 'noor@evenfall.example', password: 'seven clear nights in May' }),
    ).resolves.toBeDefined();
  });

  it('works once', async () => {
    const { link } = await invite();
    await accept(link);
    await expect(accept(link)).rejects.toMatchObject(fault('conflict'));
  });

  it('works once even when it is used twice at the same moment', async () => {
    const { link } = await invite();
    const outcomes = await Promise.allSettled([accept(link), accept(link)]);
    expect(outcomes.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  });

  it('works for 72 hours', async () => {
    const { link } = await invite();
    const [row] = await select<{ hours: number }>(
      'SELECT TIMESTAMPDIFF(MINUTE, created_at, expires_at) / 60 AS hours FROM one_time_links',
    );
    expect(Number(row?.hours)).toBe(72);
    await execute('UPDATE one_time_links SET expires_at = NOW(3)', {}, null);
    await expect(accept(link)).rejects.toMatchObject({
      ...fault('conflict'),
      message: expect.stringContaining('expired'),
    });
  });

  it('is in the database only as its hash, but for the mail that carries it', async () => {
    const { link } = await invite();
    const rows = await select<Record<string, unknown>>('SELECT * FROM one_time_links');
    expect(JSON.stringify(rows)).not.toContain(tokenIn(link));
    const mails = await select<{ recipient: string; text: string }>('SELECT recipient, text FROM mails');
    expect(mails).toMatchObject([
      { recipient: 'noor@evenfall.example', text: expect.stringContaining(link) },
    ]);
  });

  it('refuses a weak or a mistyped password with every reason, and stays open', async () => {
    const { link } = await invite();
    await expect(accept(link, 'short', 'shirt')).rejects.toMatchObject({
      ...fault('invalid-input'),
      issues: [{ path: 'password' }, { path: 'repeated' }],
    });
    await expect(accept(link)).resolves.toBeDefined();
  });

  it('ends with the next one for the same person, and ends the sessions of a lost password', async () => {
    const { person, link } = await invite();
    const { cookie } = await accept(link);
    const manager = await newCaller({ roles: ['manager'] });
    const second = await makePersonLink(manager, { person });
    const third = await makePersonLink(manager, { person });
    await expect(accept(second.link)).rejects.toMatchObject(fault('conflict'));
    await accept(third.link, 'another rather long password');
    expect(await personOfSession(cookie)).toBeNull();
  });

  it('is unknown when it is cut short', async () => {
    const { link } = await invite();
    await expect(accept(link.slice(0, -1))).rejects.toMatchObject(fault('not-found'));
  });
});

describe('people', () => {
  it('are managed by managers alone', async () => {
    const other = await newCaller({ roles: ['photometrist', 'observer'] });
    const person = await newPerson();
    const refused = fault('not-allowed');
    const named = { person: person.publicId };
    await expect(invitePerson(other, { email: 'a@b.example', name: 'A', roles: [] })).rejects.toMatchObject(
      refused,
    );
    await expect(makePersonLink(other, named)).rejects.toMatchObject(refused);
    await expect(changePerson(other, { ...named, name: 'A', roles: ['manager'] })).rejects.toMatchObject(
      refused,
    );
    await expect(disablePerson(other, named)).rejects.toMatchObject(refused);
    await expect(enablePerson(other, named)).rejects.toMatchObject(refused);
  });

  it('are not invited twice under one address', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    const again = { email: manager.email, name: 'Again', roles: [] };
    await expect(invitePerson(manager, again)).rejects.toMatchObject({
      ...fault('conflict'),
      issues: [{ path: 'email' }],
    });
  });

  it('lose session, API token and open link at once when they are disabled, and get none back', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    const person = await newPerson({ roles: ['observer'] });
    const { cookie } = await signIn(newVisitor(), { email: person.email, password: testPassword });
    const { token } = await makeToken(await callerFor(person), {
      name: 'x',
      scopes: ['read'],
      life_days: null,
    });
    const { link } = await makePersonLink(manager, { person: person.publicId });
    await disablePerson(manager, { person: person.publicId });
    const all = async () => [await personOfSession(cookie), await personOfToken(token)];
    expect(await all()).toEqual([null, null]);
    await expect(accept(link)).rejects.toMatchObject(fault('conflict'));
    await enablePerson(manager, { person: person.publicId });
    expect(await all()).toEqual([null, null]);
    await expect(
      signIn(newVisitor(), { email: person.email, password: testPassword }),
    ).resolves.toBeDefined();
  });

  it('leave an audit row with the values before and after', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    const person = await newPerson({ roles: ['observer'] });
    await changePerson(manager, { person: person.publicId, name: 'New Name', roles: ['photometrist'] });
    const rows = await select<{ before: unknown; after: unknown; person: number }>(
      'SELECT before_values AS `before`, after_values AS `after`, person_id AS person FROM audit_events WHERE subject_id = :id',
      { id: person.publicId },
    );
    expect(rows).toMatchObject([
      {
        before: { roles: ['observer'] },
        after: { name: 'New Name', roles: ['photometrist'] },
        person: manager.personId,
      },
    ]);
  });

  it('keep one session over a change of password: the one that made it', async () => {
    const person = await newPerson();
    const here = await signIn(newVisitor(), { email: person.email, password: testPassword });
    const there = await signIn(newVisitor(), { email: person.email, password: testPassword });
    const wanted = {
      password: 'an even longer password',
      repeated: 'an even longer password',
      cookie: here.cookie,
    };
    const caller = await callerFor(person);
    await expect(
      changeOwnPassword(caller, { ...wanted, current: 'wrong', visitor: newVisitor() }),
    ).rejects.toMatchObject({ ...fault('invalid-input'), issues: [{ path: 'current' }] });
    await changeOwnPassword(caller, { ...wanted, current: testPassword, visitor: newVisitor() });
    expect(await personOfSession(here.cookie)).not.toBeNull();
    expect(await personOfSession(there.cookie)).toBeNull();
  });
});

describe('the last manager', () => {
  const demote = async (by: TestPerson, person: TestPerson) =>
    changePerson(await callerFor(by), { person: person.publicId, name: 'Same', roles: ['observer'] });

  it('cannot give up the role, nor be disabled', async () => {
    const manager = await newPerson({ roles: ['manager'] });
    await newPerson({ roles: ['manager'], password: '' });
    await expect(demote(manager, manager)).rejects.toMatchObject(fault('conflict'));
    await expect(disablePerson(await callerFor(manager), { person: manager.publicId })).rejects.toMatchObject(
      fault('conflict'),
    );
  });

  it('remains when two managers take the role from each other at once: one wins', async () => {
    for (let round = 0; round < 5; round++) {
      await emptyTables();
      await newObservatory();
      const one = await newPerson({ roles: ['manager'] });
      const two = await newPerson({ roles: ['manager'] });
      const callers = [await callerFor(one), await callerFor(two)] as const;
      // Both are held at their first row until both have begun, so that they truly meet.
      const { both } = await inTransaction(async (tx) => {
        await select('SELECT id FROM people FOR UPDATE', {}, tx);
        const acts = Promise.allSettled([
          changePerson(callers[0], { person: two.publicId, name: 'Two', roles: [] }),
          changePerson(callers[1], { person: one.publicId, name: 'One', roles: [] }),
        ]);
        await new Promise((resolve) => setTimeout(resolve, 150));
        return { both: acts };
      });
      const outcomes = await both;
      const lost = outcomes.filter((outcome) => outcome.status === 'rejected');
      // A refusal that says why, not a deadlock that the database had to break.
      expect(lost.map(({ reason }) => reason as unknown)).toMatchObject([fault('conflict')]);
      const roles = [...(await rolesOf(one.id)), ...(await rolesOf(two.id))];
      expect(roles).toEqual(['manager']);
    }
  });
});

describe('the first manager', () => {
  const job: JobCaller = { kind: 'job', jobId: 'first-manager', personId: null, requestId: 'test' };
  const first = { email: 'imogen@evenfall.example', name: 'Imogen Tarrant', isAnother: false };

  it('gets an observatory and a link by which the role is taken up', async () => {
    await emptyTables();
    const { link } = await inviteFirstManager(job, first);
    const { cookie } = await accept(link);
    expect(await personOfSession(cookie)).toMatchObject({ email: first.email, roles: ['manager'] });
    expect(await select('SELECT id FROM observatories')).toHaveLength(1);
  });

  it('gets a new link as long as nobody has taken up the role', async () => {
    const lost = await inviteFirstManager(job, first);
    const { link } = await inviteFirstManager(job, first);
    await expect(accept(lost.link)).rejects.toMatchObject(fault('conflict'));
    await expect(accept(link)).resolves.toBeDefined();
  });

  it('is made once, unless another is asked for', async () => {
    await newPerson({ roles: ['manager'] });
    await expect(inviteFirstManager(job, first)).rejects.toMatchObject(fault('conflict'));
    await expect(inviteFirstManager(job, { ...first, isAnother: true })).resolves.toBeDefined();
  });
});
