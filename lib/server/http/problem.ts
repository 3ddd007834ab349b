import 'server-only';
import { problems } from '@/lib/contracts/api/problem';
import { Fault, isFault } from '@/lib/faults/fault';
import { isOutage } from '@/lib/server/data/outage';
import { logger } from '@/lib/server/log/logger';

/** What a person or program is told of any error: a fault as it stands, an outage as such, a bug by its reference only. */
export function toFault(error: unknown, requestId: string, what: string): Fault | null {
  if (isFault(error)) return error;
  logger().error({ err: error, requestId, what }, 'unexpected error');
  if (!isOutage(error)) return null;
  return new Fault(
    'unavailable',
    'The database cannot be reached just now. Nothing was changed; try again shortly.',
    {
      retryAfter_s: 5,
      cause: error,
    },
  );
}

/** Problem details, RFC 9457. */
export function problemResponse(fault: Fault | null, requestId: string): Response {
  const { status, title } = fault
    ? problems[fault.code]
    : { status: 500, title: 'Something went wrong on our side' };
  const body = {
    type: fault ? `/api-reference#problem-${fault.code}` : 'about:blank',
    title,
    status,
    detail: fault?.message ?? `The error is recorded under the reference ${requestId}.`,
    reference: requestId,
    errors: fault?.issues ?? [],
  };
  const headers = new Headers({ 'content-type': 'application/problem+json', 'x-request-id': requestId });
  if (fault?.retryAfter_s !== undefined) headers.set('retry-after', String(Math.ceil(fault.retryAfter_s)));
  if (status === 401) headers.set('www-authenticate', 'Bearer');
  return new Response(JSON.stringify(body), { status, headers });
}
