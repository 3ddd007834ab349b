import 'server-only';
import { createHash } from 'node:crypto';
import { Fault } from '@/lib/faults/fault';
import { withCompanion } from '@/lib/server/data/database';
import { doneUnanswered, freeKey, markDone, storeAnswer, takeKey } from '@/lib/server/data/idempotency';

/** The header's value is a structured-field string; a bare one is taken as well. */
export function idempotencyKey(headers: Headers): string | null {
  const header = headers.get('idempotency-key')?.trim();
  if (!header) return null;
  const key =
    header.startsWith('"') && header.endsWith('"') && header.length > 2 ? header.slice(1, -1) : header;
  if (/^[\x21-\x7e]{1,255}$/.test(key)) return key;
  throw new Fault(
    'invalid-input',
    'Idempotency-Key must be 1 to 255 printable ASCII characters without blanks.',
  );
}

interface Keyed {
  readonly personId: number;
  readonly key: string;
  /** Method, path and body: what makes two requests the same. */
  readonly content: string;
}

/** Runs `work` once for a key; later requests with the key and the same content get the first one's answer. */
export async function idempotent(keyed: Keyed, work: () => Promise<Response>): Promise<Response> {
  const { personId, key } = keyed;
  const fingerprint = createHash('sha256').update(keyed.content).digest('hex');
  const earlier = await takeKey(personId, key, fingerprint);
  if (earlier) return replay(earlier, fingerprint);
  try {
    const response = await withCompanion((tx) => markDone(tx, personId, key), work);
    const body = await response.clone().text();
    await storeAnswer(personId, key, response.status, body);
    return response;
  } catch (error) {
    // A refused request changed nothing: the sender may mend it or try again under the same key. One whose change is
    // in keeps the key.
    await freeKey(personId, key);
    throw error;
  }
}

function replay(
  earlier: { fingerprint: string; status: number | null; body: string | null },
  fingerprint: string,
): Response {
  if (earlier.fingerprint !== fingerprint) {
    throw new Fault('unprocessable', 'This Idempotency-Key was used for another request. Take a new one.');
  }
  if (earlier.status === null) {
    throw new Fault('conflict', 'The first request with this Idempotency-Key is still running.', {
      retryAfter_s: 2,
    });
  }
  if (earlier.status === doneUnanswered) {
    throw new Fault(
      'conflict',
      'The first request with this Idempotency-Key was done, but its answer is lost. Read what it made; do not send it again.',
    );
  }
  return new Response(earlier.status === 204 ? null : earlier.body, {
    status: earlier.status,
    headers: { 'content-type': 'application/json', 'idempotent-replay': 'true' },
  });
}
