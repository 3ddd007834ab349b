import { afterAll, beforeAll, expect, it } from 'vitest';
import { closeDatabase } from '@/db/connection';
import { GET } from '@/app/api/v1/health/route';
import { sessionCookieName } from '@/lib/server/identity/sessions';
import { freePort } from '@/tests/support/free-port';

// A port behind which there is nothing, as there is while the database is away.
const port = process.env['DB_PORT'];
beforeAll(async () => {
  await closeDatabase();
  process.env['DB_PORT'] = String(await freePort());
});
afterAll(async () => {
  await closeDatabase();
  process.env['DB_PORT'] = port;
});

it.each([
  ['nobody', {}],
  ['a token', { authorization: `Bearer evf_${'a'.repeat(40)}` }],
  ['a session', { cookie: `${sessionCookieName}=${'a'.repeat(40)}` }],
])('the health of a service without its database is told to %s', async (_, headers) => {
  const request = new Request('http://evenfall.example/api/v1/health', { headers });
  const answer = await GET(request, { params: Promise.resolve({}) });
  expect(answer.status).toBe(200);
  expect(await answer.json()).toMatchObject({ status: 'degraded', database: 'unreachable' });
});
