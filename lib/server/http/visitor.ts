import 'server-only';
import type { Visitor } from '@/lib/server/policy/caller';

/**
 * Who stands at the door. The address is the last one of X-Forwarded-For: the one that the nearest proxy saw, or the
 * connection's own, which the server itself fills in; anything before it the sender may have made up.
 */
export function visitorFrom(headers: Headers, requestId: string): Visitor {
  const forwarded = headers.get('x-forwarded-for')?.split(',') ?? [];
  return {
    requestId,
    address: forwarded.at(-1)?.trim().slice(0, 64) || 'unknown',
    userAgent: (headers.get('user-agent') ?? '').slice(0, 255),
  };
}
