import { describe, expect, it } from 'vitest';
import { makeToken } from '@/lib/server/acts/make-token';
import { revokeToken } from '@/lib/server/acts/revoke-token';
import { signIn } from '@/lib/server/acts/sign-in';
import { signOut } from '@/lib/server/acts/sign-out';
import { execute, select } from '@/lib/server/data/database';
import { callerFromRequest } from '@/lib/server/identity/current-caller';
import {
  callerFor,
  newCaller,
  newPerson,
  newProgramme,
  newVisitor,
  testPassword,
} from '@/tests/support/people';

const byCookie = (value: string): Request =>
  new Request('http://x/', { headers: { cookie: `light=dusk; evenfall_session=${value}` } });
const byToken = (token: string, scheme = 'Bearer'): Request =>
  new Request('http://x/', { headers: { authorization: `${scheme} ${token}` } });

describe('a session', () => {
  it('brings its person with roles and programmes, and everything a person may', async () => {
    const programme = await newProgramme('MH26B-04');
    const person = await newPerson({ roles: ['observer', 'manager'], programmes: { [programme]: 'pi' } });
    const { cookie } = await signIn(newVisitor(), { email: person.email, password: testPassword });
    const caller = await callerFromRequest(byCookie(cookie));
    expect(caller).toMatchObject({ personId: person.id, publicId: person.publicId, via: 'session' });
    expect(caller?.roles).toEqual(new Set(['observer', 'manager']));
    expect(caller?.programmes).toEqual(new Map([[programme, 'pi']]));
    expect(caller?.scopes).toEqual(new Set(['read', 'write']));
  });

  it('opens nothing any more after sign-out, though the cookie be sent again', async () => {
    const person = await newPerson();
    const { cookie } = await signIn(newVisitor(), { email: person.email, password: testPassword });
    await signOut(await callerFor(person), cookie);
    expect(await callerFromRequest(byCookie(cookie))).toBeNull();
  });

  it('is not in the database in a form that opens anything', async () => {
    const person = await newPerson();
    const { cookie } = await signIn(newVisitor(), { email: person.email, password: testPassword });
    const rows = await select<{ id: string }>('SELECT id FROM sessions WHERE person_id = :id', {
      id: person.id,
    });
    expect(rows.map(({ id }) => id)).not.toContain(cookie);
    expect(rows[0]?.id).toMatch(/^[0-9a-f]{64}$/);
    expect(await callerFromRequest(byCookie(rows[0]?.id ?? ''))).toBeNull();
  });

  it('ends when its time is over', async () => {
    const person = await newPerson();
    const { cookie } = await signIn(newVisitor(), { email: person.email, password: testPassword });
    await execute(
      'UPDATE sessions SET expires_at = NOW(3) - INTERVAL 1 SECOND WHERE person_id = :id',
      { id: person.id },
      null,
    );
    expect(await callerFromRequest(byCookie(cookie))).toBeNull();
  });

  it('lives on while it is used', async () => {
    const person = await newPerson();
    const { cookie } = await signIn(newVisitor(), { email: person.email, password: testPassword });
    await execute(
      'UPDATE sessions SET expires_at = NOW(3) + INTERVAL 1 DAY WHERE person_id = :id',
      { id: person.id },
      null,
    );
    expect(await callerFromRequest(byCookie(cookie))).not.toBeNull();
    const [row] = await select<{ days: number }>(
      'SELECT TIMESTAMPDIFF(DAY, NOW(3), expires_at) AS days FROM sessions WHERE person_id = :id',
      { id: person.id },
    );
    expect(row?.days).toBeGreaterThanOrEqual(13);
  });

  it('is replaced, not joined, when its browser signs in again', async () => {
    const person = await newPerson();
    const first = await signIn(newVisitor(), { email: person.email, password: testPassword });
    await signIn(newVisitor(), { email: person.email, password: testPassword }, first.cookie);
    expect(await callerFromRequest(byCookie(first.cookie))).toBeNull();
  });
});

describe('an API token', () => {
  it('brings its person with no more than its scopes', async () => {
    const caller = await newCaller({ roles: ['observer'] });
    const { token } = await makeToken(caller, { name: 'dome', scopes: ['read'], life_days: null });
    expect(token).toMatch(/^evf_[A-Za-z0-9_-]{43}$/);
    const found = await callerFromRequest(byToken(token, 'bearer'));
    expect(found).toMatchObject({ personId: caller.personId, via: 'token' });
    expect(found?.scopes).toEqual(new Set(['read']));
  });

  it('is kept only as its hash, and tells when it was last used', async () => {
    const caller = await newCaller();
    const { id, token } = await makeToken(caller, { name: 'dome', scopes: ['read'], life_days: 30 });
    await callerFromRequest(byToken(token));
    const [row] = await select<Record<string, unknown>>('SELECT * FROM api_tokens WHERE public_id = :id', {
      id,
    });
    expect(JSON.stringify(row)).not.toContain(token);
    expect(row?.['last_used_at']).toBeInstanceOf(Date);
  });

  it.each([
    ['revoked', 'revoked_at = NOW(3)'],
    ['expired', 'expires_at = NOW(3)'],
  ])('opens nothing once it is %s', async (_state, change) => {
    const caller = await newCaller();
    const { id, token } = await makeToken(caller, { name: 'x', scopes: ['read', 'write'], life_days: 1 });
    expect(await callerFromRequest(byToken(token))).not.toBeNull();
    await execute(`UPDATE api_tokens SET ${change} WHERE public_id = :id`, { id }, null);
    expect(await callerFromRequest(byToken(token))).toBeNull();
  });

  it('that is wrong is not made good by a session cookie beside it', async () => {
    const person = await newPerson();
    const { cookie } = await signIn(newVisitor(), { email: person.email, password: testPassword });
    const headers = { cookie: `evenfall_session=${cookie}`, authorization: 'Bearer evf_wrong' };
    expect(await callerFromRequest(new Request('http://x/', { headers }))).toBeNull();
  });

  it('is revoked by its owner or a manager, and is unknown to others', async () => {
    const caller = await newCaller();
    const { id, token } = await makeToken(caller, { name: 'x', scopes: ['read'], life_days: 1 });
    await expect(
      revokeToken(await newCaller({ roles: ['photometrist'] }), { token: id }),
    ).rejects.toMatchObject({
      code: 'not-found',
    });
    await revokeToken(await newCaller({ roles: ['manager'] }), { token: id });
    expect(await callerFromRequest(byToken(token))).toBeNull();
    await expect(revokeToken(caller, { token: id })).rejects.toMatchObject({ code: 'not-found' });
  });
});
