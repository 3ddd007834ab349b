import { describe, expect, it } from 'vitest';
import { database } from '@/db/connection';
import { inTransaction, insert } from '@/lib/server/data/database';
import { callerFromRequest } from '@/lib/server/identity/current-caller';
import { lucia } from '@/lib/server/identity/sessions';
import { newApiToken } from '@/lib/server/identity/tokens';
import { newPublicId } from '@/lib/server/data/public-id';

async function newPerson(email: string): Promise<number> {
  return insert(
    'INSERT INTO people (public_id, email, name) VALUES (:publicId, :email, :email)',
    { publicId: newPublicId(), email },
    null,
  );
}

const byCookie = (value: string): Request =>
  new Request('http://x/', { headers: { cookie: `a=b; evenfall_session=${value}` } });

describe('a session', () => {
  it('brings its person with roles and programmes, and ends for good', async () => {
    const personId = await newPerson('a@evenfall.example');
    await database().query(
      `INSERT INTO person_roles VALUES (${personId}, 'observer'), (${personId}, 'manager')`,
    );
    const session = await inTransaction((tx) => lucia(tx).createSession(personId, { userAgent: 'test' }));
    const caller = await callerFromRequest(byCookie(session.id));
    expect(caller?.personId).toBe(personId);
    expect([...(caller?.roles ?? [])].sort()).toEqual(['manager', 'observer']);
    expect(caller?.via).toBe('session');
    await lucia().invalidateSession(session.id);
    expect(await callerFromRequest(byCookie(session.id))).toBeNull();
  });
  it('token', async () => {
    const personId = await newPerson('b@evenfall.example');
    const { token, hash } = newApiToken();
    await insert(
      `INSERT INTO api_tokens (public_id, person_id, name, token_hash, scopes) VALUES ('aaaaaaaaaaab', :personId, 'x', :hash, '["read"]')`,
      { personId, hash },
      null,
    );
    const caller = await callerFromRequest(
      new Request('http://x/', { headers: { authorization: `Bearer ${token}` } }),
    );
    expect(caller?.personId).toBe(personId);
    expect([...(caller?.scopes ?? [])]).toEqual(['read']);
  });
});
