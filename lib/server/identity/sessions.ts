import 'server-only';
import { Lucia, TimeSpan, type Adapter, type DatabaseSession } from 'lucia';
import { callerOfSession, type CallerRow } from '@/lib/server/data/callers';
import type { Tx } from '@/lib/server/data/database';
import * as sessions from '@/lib/server/data/sessions';
import { environment } from '@/lib/server/settings/environment';
import { secretHash } from './secrets';

/** A session ends when it has not been used for this long. */
const sessionLife = new TimeSpan(14, 'd');
export const sessionCookieName = 'evenfall_session';

interface SessionAttributes {
  readonly userAgent: string;
}

declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof lucia>;
    DatabaseSessionAttributes: SessionAttributes;
    DatabaseUserAttributes: CallerRow;
    UserId: number;
  }
}

/**
 * Lucia on our tables. Ids are hashed on the way in, so that nothing in the database opens a session; the ids of listed
 * sessions are therefore hashes.
 */
function adapter(tx: Tx | null): Adapter {
  return {
    async getSessionAndUser(id) {
      const found = await callerOfSession(secretHash(id));
      if (!found) return [null, null];
      const session: DatabaseSession = {
        id,
        userId: found.personId,
        expiresAt: found.expiresAt,
        attributes: { userAgent: '' },
      };
      return [session, found.person && { id: found.personId, attributes: found.person }];
    },
    async getUserSessions(personId) {
      const rows = await sessions.sessionsOfPerson(personId, tx);
      return rows.map((row) => ({
        id: row.hash,
        userId: row.personId,
        expiresAt: row.expiresAt,
        attributes: { userAgent: row.userAgent },
      }));
    },
    async setSession({ id, userId, expiresAt, attributes }) {
      const { userAgent } = attributes;
      await sessions.insertSession({ hash: secretHash(id), personId: userId, expiresAt, userAgent }, tx);
    },
    updateSessionExpiration: (id, expiresAt) => sessions.extendSession(secretHash(id), expiresAt, tx),
    async deleteSession(id) {
      await sessions.deleteSession(secretHash(id), tx);
    },
    async deleteUserSessions(personId) {
      await sessions.deleteSessionsOfPerson(personId, null, tx);
    },
    async deleteExpiredSessions() {
      await sessions.deleteExpiredSessions(tx);
    },
  };
}

/** Lucia, within a transaction if one is given. */
export function lucia(tx: Tx | null = null) {
  return new Lucia<Record<never, never>, { caller: CallerRow }>(adapter(tx), {
    sessionExpiresIn: sessionLife,
    sessionCookie: {
      name: sessionCookieName,
      // The cookie outlives the session: the database alone says when a session ends, and pages need set no cookie.
      expires: false,
      attributes: { secure: environment().secureCookies, sameSite: 'lax', path: '/' },
    },
    getUserAttributes: (caller) => ({ caller }),
  });
}

/** Begins a session and returns its cookie's value, which is kept nowhere else. */
export async function startSession(personId: number, userAgent: string, tx: Tx): Promise<string> {
  const session = await lucia(tx).createSession(personId, { userAgent: userAgent.slice(0, 255) });
  return session.id;
}

/** Ends the session of a cookie; false when it had ended before. */
export async function endSession(cookie: string, tx: Tx): Promise<boolean> {
  return sessions.deleteSession(secretHash(cookie), tx);
}

/** The person behind a session cookie's value, or null when the session has ended or its person is disabled. */
export async function personOfSession(cookie: string): Promise<CallerRow | null> {
  const { user } = await lucia().validateSession(cookie);
  return user?.caller ?? null;
}

/** The session cookie's value in a Cookie header, or null. */
export function sessionCookieIn(header: string | null): string | null {
  return header === null ? null : lucia().readSessionCookie(header);
}
