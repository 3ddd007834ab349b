import { beforeEach, describe, expect, it } from 'vitest';
import type { ApiResult } from '@/app/_components/hooks/call-api';
import { drainQueue } from '../../../app/(log)/_components/queue/drain-queue';
import { nextToSend, pause_s, type QueueEntry } from '../../../app/(log)/_components/queue/queue-entry';
import { changeQueue, readQueue } from '../../../app/(log)/_components/queue/queue-store';
import type { Logged } from '../../../app/(log)/_components/queue/send-entry';

let count = 0;
function entry(told: Partial<QueueEntry> = {}): QueueEntry {
  count += 1;
  return {
    key: `key-${count}`,
    person: 'noor',
    personName: 'Noor Hathaway',
    night: '3kq8v7m2t0xc',
    nightName: '3 November 2026, larkspur',
    madeAt: '2026-11-03T23:41:05.000Z',
    outgoing: { kind: 'remark', body: { text: `remark ${count}`, utc: '2026-11-03T23:41:05.000Z' } },
    refused: null,
    ...told,
  };
}
const taken: ApiResult<Logged> = { ok: true, value: { kind: 'remark', value: {} as never } };
const down: ApiResult<Logged> = { ok: false, kind: 'unreachable', retryAfter_s: null };
const refusal: ApiResult<Logged> = {
  ok: false,
  kind: 'refused',
  refusal: { status: 409, detail: 'The night is closed.', issues: [], reference: undefined },
};
const drain = (send: (one: QueueEntry) => Promise<ApiResult<Logged>>, onLogged = () => undefined as void) =>
  drainQueue({ person: 'noor', onLogged, send });

beforeEach(() => {
  localStorage.clear();
});

describe('the queue of log entries', () => {
  it('keeps entries in the browser, so that a reload finds them', () => {
    const one = entry();
    changeQueue((entries) => [...entries, one]);
    expect(JSON.parse(localStorage.getItem('evenfall.log-queue') ?? '[]')).toEqual([one]);
    expect(readQueue()).toEqual([one]);
  });

  it('sends them in the order they were made, each under its own key', async () => {
    const [first, second] = [entry(), entry()];
    changeQueue(() => [first, second]);
    const sent: string[] = [];
    const end = await drain(async ({ key }) => {
      sent.push(key);
      return taken;
    });
    expect(sent).toEqual([first.key, second.key]);
    expect([end, readQueue()]).toEqual([{ kind: 'empty' }, []]);
  });

  it('stops at a dead link and keeps everything, the entry it tried included, under the same key', async () => {
    const [first, second] = [entry(), entry()];
    changeQueue(() => [first, second]);
    expect(await drain(async () => down)).toMatchObject({ kind: 'unreachable' });
    expect(readQueue()).toEqual([first, second]);
  });

  it('keeps what the server refuses, with the reason, and goes on with the rest', async () => {
    const [first, second] = [entry(), entry()];
    changeQueue(() => [first, second]);
    await drain(async ({ key }) => (key === first.key ? refusal : taken));
    expect(readQueue()).toEqual([{ ...first, refused: { detail: 'The night is closed.', issues: [] } }]);
  });

  it('stops when the session has ended, and loses nothing', async () => {
    changeQueue(() => [entry()]);
    expect(await drain(async () => ({ ok: false, kind: 'signed-out' }))).toMatchObject({
      kind: 'signed-out',
    });
    expect(readQueue()).toHaveLength(1);
  });

  it('sends nobody else’s entries, and nothing twice that was refused', () => {
    const own = entry();
    const refused = { detail: 'no', issues: [] };
    expect(nextToSend([entry({ person: 'sefa' }), entry({ refused }), own], 'noor')).toBe(own);
    expect(nextToSend([entry({ person: 'sefa' })], 'noor')).toBeNull();
  });

  it('sees what another tab has added while it was sending', async () => {
    const late = entry();
    changeQueue(() => [entry()]);
    const sent: string[] = [];
    await drain(async ({ key }) => {
      sent.push(key);
      if (sent.length === 1) changeQueue((entries) => [...entries, late]);
      return taken;
    });
    expect(sent).toContain(late.key);
  });

  it('puts aside, and does not throw away, what it cannot read', () => {
    localStorage.setItem('evenfall.log-queue', '[{"from":"another version"}]');
    expect(readQueue()).toEqual([]);
    expect(localStorage.getItem('evenfall.log-queue.unreadable')).toContain('another version');
  });

  it('waits longer after each failure, but never more than half a minute', () => {
    expect([1, 2, 3, 9].map(pause_s)).toEqual([2, 4, 8, 30]);
  });
});
