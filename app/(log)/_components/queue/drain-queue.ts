import type { ApiResult } from '@/app/_components/hooks/call-api';
import { nextToSend, type QueueEntry } from './queue-entry';
import { changeQueue, readQueue } from './queue-store';
import { sendEntry, type Logged } from './send-entry';

export type Drained =
  | { readonly kind: 'empty' }
  /** Another tab is at it. */
  | { readonly kind: 'elsewhere' }
  | { readonly kind: 'unreachable'; readonly retryAfter_s: number | null }
  | { readonly kind: 'signed-out' };

interface Draining {
  readonly person: string;
  readonly onLogged: (entry: QueueEntry, logged: Logged) => void;
  /** For tests; the HTTP interface otherwise. */
  readonly send?: (entry: QueueEntry) => Promise<ApiResult<Logged>>;
}

function settle(entry: QueueEntry, result: ApiResult<Logged>, draining: Draining): Drained | null {
  if (result.ok) {
    draining.onLogged(entry, result.value);
    changeQueue((entries) => entries.filter(({ key }) => key !== entry.key));
    return null;
  }
  if (result.kind !== 'refused') return result;
  const { detail, issues } = result.refusal;
  const refused = { detail, issues: issues.map(({ path, message }) => ({ path, message })) };
  changeQueue((entries) => entries.map((one) => (one.key === entry.key ? { ...one, refused } : one)));
  return null;
}

/** Sends what waits, one after the other in the order it was made, until nothing waits or the link is down. */
async function drain(draining: Draining): Promise<Drained> {
  for (;;) {
    const entry = nextToSend(readQueue(), draining.person);
    if (entry === null) return { kind: 'empty' };
    const end = settle(entry, await (draining.send ?? sendEntry)(entry), draining);
    if (end !== null) return end;
  }
}

/** The same, in one tab at a time where the browser can tell; where not, the keys keep entries from being logged twice. */
export async function drainQueue(draining: Draining): Promise<Drained> {
  if (!('locks' in navigator)) return drain(draining);
  return navigator.locks.request('evenfall.log-queue', { ifAvailable: true }, async (lock) =>
    lock === null ? { kind: 'elsewhere' as const } : drain(draining),
  );
}
