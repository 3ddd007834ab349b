import { z } from 'zod';
import type { Operation } from '@/lib/contracts/api/operation';
import type { Issue } from '@/lib/faults/fault';

// The schemas would compile themselves by `eval`, which the pages' content policy refuses.
z.config({ jitless: true });

/** A refusal as the interface words it: the problem details of RFC 9457. */
export interface Refusal {
  readonly status: number;
  readonly detail: string;
  readonly issues: readonly Issue[];
  readonly reference: string | undefined;
}

export type ApiResult<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly kind: 'refused'; readonly refusal: Refusal }
  /** The session has ended. */
  | { readonly ok: false; readonly kind: 'signed-out' }
  /** No answer, or one that says to come back: what was sent may have arrived, and is sent again under the same key. */
  | { readonly ok: false; readonly kind: 'unreachable'; readonly retryAfter_s: number | null };

type Answer<O extends Operation> = O['answer'] extends z.ZodType ? z.output<O['answer']> : undefined;

interface CallOptions<O extends Operation> {
  readonly params?: Readonly<Record<string, string>>;
  readonly query?: Readonly<Record<string, string>>;
  readonly body?: O['body'] extends z.ZodType ? z.input<O['body']> : undefined;
  /** Idempotency-Key: the same call sent again is done once. */
  readonly key?: string;
  readonly signal?: AbortSignal;
}

function addressOf(operation: Operation, { params = {}, query }: CallOptions<Operation>): string {
  const path = operation.path.replaceAll(/\{(\w+)\}/g, (_, name: string) =>
    encodeURIComponent(params[name] ?? ''),
  );
  const search = new URLSearchParams(query).toString();
  return `/api/v1${path}${search === '' ? '' : `?${search}`}`;
}

interface Problem {
  readonly detail?: string;
  readonly reference?: string;
  readonly errors?: readonly Issue[];
}

async function refusalOf(response: Response): Promise<Refusal> {
  const isProblem = response.headers.get('content-type')?.includes('json') ?? false;
  const problem = isProblem ? ((await response.json()) as Problem) : {};
  return {
    status: response.status,
    detail: problem.detail ?? `The server answered ${response.status}.`,
    issues: problem.errors ?? [],
    reference: response.status >= 500 ? problem.reference : undefined,
  };
}

/** Whether the same request may succeed later: an outage, a crowd, or its first sending still at work. */
function isPassing(response: Response): boolean {
  return (
    [408, 425, 429, 502, 503, 504].includes(response.status) ||
    (response.status === 409 && response.headers.has('retry-after'))
  );
}

/** One call of the HTTP interface from a page, by the session's cookie. Never throws but when it was aborted. */
export async function callApi<const O extends Operation>(
  operation: O,
  options: CallOptions<O> = {},
): Promise<ApiResult<Answer<O>>> {
  let response: Response;
  try {
    response = await fetch(addressOf(operation, options as CallOptions<Operation>), {
      method: operation.method.toUpperCase(),
      headers: {
        accept: 'application/json',
        ...(options.body === undefined ? {} : { 'content-type': 'application/json' }),
        ...(options.key === undefined ? {} : { 'idempotency-key': options.key }),
      },
      ...(options.body === undefined ? {} : { body: JSON.stringify(options.body) }),
      ...(options.signal === undefined ? {} : { signal: options.signal }),
    });
  } catch (error) {
    // Fetch rejects for a dead link and for an abort alike; only the abort was asked for.
    if (options.signal?.aborted === true) throw error;
    return { ok: false, kind: 'unreachable', retryAfter_s: null };
  }
  if (response.status === 401) return { ok: false, kind: 'signed-out' };
  if (isPassing(response)) {
    const after = Number(response.headers.get('retry-after') ?? Number.NaN);
    return { ok: false, kind: 'unreachable', retryAfter_s: Number.isFinite(after) ? after : null };
  }
  if (!response.ok) return { ok: false, kind: 'refused', refusal: await refusalOf(response) };
  const value = response.status === 204 ? undefined : ((await response.json()) as unknown);
  return { ok: true, value: value as Answer<O> };
}

/** A key for a call that may be sent twice; also where pages come over plain HTTP, which has no randomUUID. */
export function newKey(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}
