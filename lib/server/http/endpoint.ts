import 'server-only';
import { randomUUID } from 'node:crypto';
import type { AnswerOf, BodyOf, Operation, ParamsOf, QueryOf } from '@/lib/contracts/api/operation';
import { Fault } from '@/lib/faults/fault';
import { callerFromRequest } from '@/lib/server/identity/current-caller';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { idempotencyKey, idempotent } from './idempotent';
import { demandSameOrigin } from './origin';
import { parseInput } from './parse-input';
import { problemResponse, toFault } from './problem';
import { parseJson, readText } from './read-json';

export interface Call<O extends Operation> {
  /** Null only for an open operation that was called without sign-in, or that does not ask. */
  readonly caller: O['open'] extends true ? PersonCaller | null : PersonCaller;
  readonly params: ParamsOf<O>;
  readonly query: QueryOf<O>;
  readonly body: BodyOf<O>;
  readonly request: Request;
  readonly requestId: string;
  /**
   * For a raw body, which cannot be compared before it has been read: runs the work once for the Idempotency-Key, if
   * there is one, and these words about the body, such as its hash. Other operations are kept so by themselves.
   */
  readonly once: (content: string, work: () => Promise<AnswerOf<O>>) => Promise<Kept<O>>;
}
/** What `once` gives is a response already. */
type Kept<O extends Operation> = O['raw'] extends readonly string[] ? Response : never;
type Handler<O extends Operation> = (call: Call<O>) => Promise<AnswerOf<O> | Kept<O>>;
interface RouteContext {
  readonly params: Promise<Record<string, string | string[] | undefined>>;
}
type Route = (request: Request, context: RouteContext) => Promise<Response>;

/**
 * A route handler from an operation and what it does: request id, caller, origin, input by schema, idempotency, answer
 * by schema, every error as problem details. Routes hold nothing but calls of this.
 */
export function endpoint<const O extends Operation>(operation: O, handler: Handler<O>): Route {
  return async (request, context) => {
    const requestId = randomUUID();
    try {
      return await answer(operation, handler, { request, requestId, params: await context.params });
    } catch (error) {
      return problemResponse(toFault(error, requestId, operation.id), requestId);
    }
  };
}

interface Incoming {
  readonly request: Request;
  readonly requestId: string;
  readonly params: Record<string, string | string[] | undefined>;
}

async function answer<O extends Operation>(
  operation: O,
  handler: Handler<O>,
  incoming: Incoming,
): Promise<Response> {
  const { request, requestId } = incoming;
  const caller = operation.anonymous ? null : await callerFromRequest(request);
  if (operation.method !== 'get') demandSameOrigin(request.headers, caller?.via ?? 'nobody');
  if (!caller && !operation.open) {
    throw new Fault('not-signed-in', 'Sign in, or send an API token as “Authorization: Bearer …”.');
  }
  const url = new URL(request.url);
  const isRaw = operation.raw !== undefined;
  const text = operation.body && !isRaw ? await readText(request) : '';
  const isKept = operation.method !== 'get' && !operation.stream && !operation.secret;
  const key = isKept && caller ? { personId: caller.personId, key: idempotencyKey(request.headers) } : null;
  const keep = (about: string, work: () => Promise<Response>): Promise<Response> => {
    if (!key?.key) return work();
    const content = `${operation.method} ${url.pathname}${url.search}\n${about}`;
    return idempotent({ personId: key.personId, key: key.key, content }, work);
  };
  const call = {
    caller: caller && { ...caller, requestId },
    params: operation.params && parseInput(operation.params, incoming.params, 'path'),
    query: operation.query && parseInput(operation.query, queryValues(url.searchParams), 'query'),
    body: operation.body && !isRaw ? parseInput(operation.body, parseJson(text), 'body') : undefined,
    request,
    requestId,
    once: (about, work) => keep(about, async () => toResponse(operation, await work(), requestId)),
  } as Call<O>;
  const run = async (): Promise<Response> => toResponse(operation, await handler(call), requestId);
  return isRaw ? run() : keep(text, run);
}

/** One value a name; a repeated name is refused by the schemas, which expect no list. */
function queryValues(search: URLSearchParams): Record<string, string | readonly string[]> {
  const values: Record<string, string | readonly string[]> = {};
  for (const name of new Set(search.keys())) {
    const all = search.getAll(name);
    values[name] = all.length === 1 ? (all[0] ?? '') : all;
  }
  return values;
}

function toResponse(operation: Operation, result: unknown, requestId: string): Response {
  if (result instanceof Response) {
    result.headers.set('x-request-id', requestId);
    return result;
  }
  const headers = { 'x-request-id': requestId, 'cache-control': 'private, no-store' };
  if (!operation.answer) return new Response(null, { status: operation.status ?? 204, headers });
  // Parsing strips whatever the schema does not name: nothing leaves by accident.
  return Response.json(operation.answer.parse(result), { status: operation.status ?? 200, headers });
}
