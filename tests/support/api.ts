import { randomUUID } from 'node:crypto';
import request, { type Response } from 'supertest';
import { expect, inject } from 'vitest';
import { faultsOf } from '@/lib/contracts/api/openapi-document';
import type { Operation } from '@/lib/contracts/api/operation';
import { Problem, problems } from '@/lib/contracts/api/problem';

export interface ApiCall {
  readonly token?: string;
  readonly params?: Readonly<Record<string, string>>;
  readonly query?: Readonly<Record<string, string | number>>;
  readonly body?: object | string;
  readonly headers?: Readonly<Record<string, string>>;
}

/** Calls an operation of the running application and holds the answer to what the document says of it. */
export async function callApi(operation: Operation, call: ApiCall = {}): Promise<Response> {
  const path = operation.path.replace(/\{(\w+)\}/g, (_, name: string) =>
    encodeURIComponent(call.params?.[name] ?? `no-${name}`),
  );
  const sent = request(inject('baseUrl'))
    [operation.method](`/api/v1${path}`)
    .query({ ...call.query })
    .set({ ...(call.token === undefined ? {} : { authorization: `Bearer ${call.token}` }), ...call.headers });
  if (call.body !== undefined)
    sent.set('content-type', call.headers?.['content-type'] ?? 'application/json').send(call.body);
  const answer = await sent;
  expectAsDocumented(operation, answer);
  return answer;
}

function expectAsDocumented(operation: Operation, answer: Response): void {
  const what = `${operation.id}: ${answer.status} ${answer.text?.slice(0, 500)}`;
  expect(answer.headers['x-request-id'] ?? answer.headers['idempotent-replay'], what).toBeTruthy();
  if (answer.status >= 400) {
    expect(answer.headers['content-type'], what).toContain('application/problem+json');
    const problem = Problem.parse(answer.body);
    expect(problem.status, what).toBe(answer.status);
    expect(
      faultsOf(operation).map((code) => problems[code].status),
      what,
    ).toContain(answer.status);
    return;
  }
  expect(answer.status, what).toBe(operation.status ?? (operation.answer || operation.stream ? 200 : 204));
  // What the schema strips, or adds, the answer must not have had, or lacked.
  if (operation.answer) expect(operation.answer.parse(answer.body), what).toEqual(answer.body);
}

const tokens = new Map<string, string>();

/** An API token of a demo account, made once. */
export async function demoToken(
  account: string,
  scopes: readonly string[] = ['read', 'write'],
): Promise<string> {
  const known = tokens.get(`${account} ${scopes.join()}`);
  if (known !== undefined) return known;
  const answer = await request(inject('baseUrl'))
    .post('/api/v1/tokens')
    .send({
      email: `${account}@evenfall.example`,
      password: inject('demoPassword'),
      name: `test ${randomUUID()}`,
      scopes,
    });
  expect(answer.status, answer.text).toBe(201);
  const { token } = answer.body as { token: string };
  tokens.set(`${account} ${scopes.join()}`, token);
  return token;
}
