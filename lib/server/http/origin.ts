import 'server-only';
import { verifyRequestOrigin } from 'lucia';
import { Fault } from '@/lib/faults/fault';
import { environment } from '@/lib/server/settings/environment';

/**
 * Refuses a write that another site's page sent. A browser always names the origin of a write; without one only a
 * program can be asking, and a program has no business with a session cookie.
 */
export function demandSameOrigin(headers: Headers, via: 'session' | 'token' | 'nobody'): void {
  const origin = headers.get('origin');
  if (origin === null) {
    if (via !== 'session') return;
    throw new Fault('not-allowed', 'A write by session must name its origin. Programs use an API token.');
  }
  const hosts = [headers.get('host'), new URL(environment().baseUrl).host].filter((host) => host !== null);
  if (origin !== 'null' && verifyRequestOrigin(origin, hosts)) return;
  throw new Fault('not-allowed', `Writes from the origin ${origin.slice(0, 100)} are not accepted.`);
}
