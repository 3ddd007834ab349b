import request from 'supertest';
import { describe, expect, inject, it } from 'vitest';
import { openNight } from '@/lib/contracts/api/night';
import { getOpenApiDocument } from '@/lib/contracts/api/openapi';
import { openApiDocument } from '@/lib/contracts/api/openapi-document';
import { operations } from '@/lib/contracts/api/operations';
import { inTransaction, selectOne } from '@/lib/server/data/database';
import { lucia, sessionCookieName } from '@/lib/server/identity/sessions';
import { callApi, demoToken } from '../support/api';

const server = request(inject('baseUrl'));
const named = operations.map((operation) => [operation.id, operation] as const);

describe('the interface', () => {
  it('serves the document that the code makes, to everybody', async () => {
    const { body } = await callApi(getOpenApiDocument);
    expect(body).toEqual(JSON.parse(JSON.stringify(openApiDocument())));
  });

  it('explains itself on a page that needs no sign-in and loads nothing from elsewhere', async () => {
    const page = await server.get('/api-reference');
    expect(page.status).toBe(200);
    for (const { path } of operations) expect(page.text).toContain(path);
    expect(page.text.match(/(?:src|href)="https?:\/\/(?!127\.0\.0\.1)[^"]*"/g)).toBeNull();
  });

  it.each(named.filter(([, { open }]) => open !== true))('%s needs a caller', async (_, operation) => {
    const answer = await callApi(operation, { body: operation.method === 'get' ? undefined : {} } as object);
    expect(answer.status).toBe(401);
    expect(answer.headers['www-authenticate']).toBe('Bearer');
    expect((await callApi(operation, { token: 'evf_not-a-token' })).status).toBe(401);
  });

  it.each(named.filter(([, { method, params }]) => method === 'get' && params))(
    '%s does not find what is not there',
    async (_, operation) => {
      expect((await callApi(operation, { token: await demoToken('photometrist') })).status).toBe(404);
    },
  );
});

describe('a write by session', () => {
  const date = (() => {
    let day = 10;
    return (): string => `2032-01-${String(day++)}`;
  })();

  async function cookieOf(account: string): Promise<string> {
    const person = await selectOne<{ id: number }>('SELECT id FROM people WHERE email = :email', {
      email: `${account}@evenfall.example`,
    });
    const session = await inTransaction((tx) =>
      lucia(tx).createSession(person?.id ?? 0, { userAgent: 'test' }),
    );
    return `${sessionCookieName}=${session.id}`;
  }
  const open = async (headers: Record<string, string>) =>
    callApi(openNight, {
      headers: { cookie: await cookieOf('observer'), ...headers },
      body: { telescope: 'larkspur', date: date() },
    });

  it('is taken from our own pages', async () => {
    expect((await open({ origin: inject('baseUrl') })).status).toBe(201);
  });

  it.each([
    ['another site', { origin: 'https://elsewhere.example' }],
    ['the same host under another name', { origin: inject('baseUrl').replace('127.0.0.1', 'localhost') }],
    ['a page without an origin', { origin: 'null' }],
    ['something that names no origin', {} as Record<string, string>],
  ])('is refused from %s', async (_, headers) => {
    const answer = await open(headers);
    expect(answer.status).toBe(403);
  });

  it('is refused by token, too, when a page of another site sends it', async () => {
    const answer = await callApi(openNight, {
      token: await demoToken('observer'),
      headers: { origin: 'https://elsewhere.example' },
      body: { telescope: 'larkspur', date: date() },
    });
    expect(answer.status).toBe(403);
  });
});

describe('a token that may only read', () => {
  it('reads and writes nothing', async () => {
    const token = await demoToken('observer', ['read']);
    const answer = await callApi(openNight, { token, body: { telescope: 'larkspur', date: '2032-02-01' } });
    expect(answer.status).toBe(403);
    expect((answer.body as { detail: string }).detail).toContain('may only read');
  });
});
