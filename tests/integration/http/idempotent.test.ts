import { beforeAll, describe, expect, it } from 'vitest';
import { execute, inTransaction, select } from '@/lib/server/data/database';
import { idempotent } from '@/lib/server/http/idempotent';
import { Fault } from '@/lib/faults/fault';
import { faultOf } from '../../support/fault-of';
import { newPerson } from '../../support/people';

let personId: number;
let count = 0;
beforeAll(async () => {
  personId = (await newPerson()).id;
});

const freshKey = () => ({ personId, key: `key-${(count += 1)}`, content: 'post /x\n{}' });
/** A change that can be counted. */
const change = (mark: string): Promise<number> =>
  inTransaction((tx) =>
    execute(
      `INSERT INTO audit_events (person_id, act, subject_kind, subject_id) VALUES (:personId, 'test', 'test', :mark)`,
      { personId, mark },
      tx,
    ),
  );
const changes = async (mark: string): Promise<number> =>
  (await select('SELECT id FROM audit_events WHERE subject_id = :mark', { mark })).length;

describe('a write with an Idempotency-Key', () => {
  it('is done once and answered alike', async () => {
    const keyed = freshKey();
    const work = async (): Promise<Response> => {
      await change(keyed.key);
      return Response.json({ n: await changes(keyed.key) }, { status: 201 });
    };
    const [first, second] = [await idempotent(keyed, work), await idempotent(keyed, work)];
    expect([first.status, await first.json()]).toEqual([201, { n: 1 }]);
    expect([second.status, await second.json()]).toEqual([201, { n: 1 }]);
    expect(second.headers.get('idempotent-replay')).toBe('true');
    expect((await faultOf(idempotent({ ...keyed, content: 'post /x\n{"a":1}' }, work))).code).toBe(
      'unprocessable',
    );
  });

  it('can be sent again when it was refused', async () => {
    const keyed = freshKey();
    const refused = async (): Promise<Response> =>
      inTransaction(() => Promise.reject(new Fault('conflict', 'not now')));
    expect((await faultOf(idempotent(keyed, refused))).message).toBe('not now');
    expect((await idempotent(keyed, async () => Response.json({}))).status).toBe(200);
  });

  it('is not done twice when the process dies between the change and the answer', async () => {
    const keyed = freshKey();
    const dies = async (): Promise<Response> => {
      await change(keyed.key);
      throw new Error('the end of the process, as it were');
    };
    await expect(idempotent(keyed, dies)).rejects.toThrow('the end of the process');
    // Long after the time at which an unanswered request counts as abandoned.
    await execute(
      'UPDATE idempotency_keys SET created_at = NOW() - INTERVAL 1 HOUR WHERE idempotency_key = :key',
      { key: keyed.key },
      null,
    );
    const fault = await faultOf(idempotent(keyed, dies));
    expect(fault.code).toBe('conflict');
    expect(fault.message).toContain('was done, but its answer is lost');
    expect(await changes(keyed.key)).toBe(1);
  });

  it('is taken up again when the process died before the change', async () => {
    const keyed = freshKey();
    await execute(
      `INSERT INTO idempotency_keys (person_id, idempotency_key, fingerprint, expires_at, created_at)
       VALUES (:personId, :key, REPEAT('0', 64), NOW() + INTERVAL 1 DAY, NOW() - INTERVAL 1 HOUR)`,
      { personId, key: keyed.key },
      null,
    );
    expect((await idempotent(keyed, async () => Response.json({}))).status).toBe(200);
  });

  it('is done by one of many that are sent at once', async () => {
    const keyed = freshKey();
    const work = async (): Promise<Response> => {
      await change(keyed.key);
      return Response.json({});
    };
    const all = await Promise.allSettled(Array.from({ length: 6 }, () => idempotent(keyed, work)));
    expect(all.some(({ status }) => status === 'fulfilled')).toBe(true);
    expect(await changes(keyed.key)).toBe(1);
  });
});
