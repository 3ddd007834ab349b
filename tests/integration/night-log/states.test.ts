import { beforeAll, describe, expect, it } from 'vitest';
import type { Night } from '@/lib/contracts/api/night';
import { isFault, type Fault } from '@/lib/faults/fault';
import { changeNight } from '@/lib/server/acts/change-night';
import { closeNight } from '@/lib/server/acts/close-night';
import { openNight } from '@/lib/server/acts/open-night';
import { reopenNight } from '@/lib/server/acts/reopen-night';
import { execute, select } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { faultOf } from '../../support/fault-of';
import { newCaller, newLogWorld } from '../../support/log-world';

let noor: PersonCaller;
let other: PersonCaller;
let stranger: PersonCaller;
let photometrist: PersonCaller;
let pi: PersonCaller;
let day = 1;

beforeAll(async () => {
  const world = await newLogWorld();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  other = await newCaller('Ilse Brandt', { roles: ['observer'] });
  stranger = await newCaller('Nobody');
  photometrist = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
  pi = await newCaller('Tomas Verrall', { programmes: [[world.thistle, 'pi']] });
});

const nextDate = (): string => `2026-09-${String(day++).padStart(2, '0')}`;
const openTonight = (caller = noor): Promise<Night> =>
  openNight(caller, { telescope: 'larkspur', date: nextDate() });

async function auditOf(
  subjectId: string,
): Promise<readonly { act: string; reason: string; before: object; after: object }[]> {
  return select(
    `SELECT act, reason, before_values AS \`before\`, after_values AS \`after\` FROM audit_events
      WHERE subject_id = :subjectId ORDER BY id`,
    { subjectId },
  );
}

describe('opening a night', () => {
  it('runs it from local noon to local noon and makes its opener the observer', async () => {
    const night = await openTonight();
    expect(night).toMatchObject({
      state: 'open',
      telescope: 'larkspur',
      version: 1,
      frames: 0,
      opened_by: 'Noor Hathaway',
    });
    // Summer time on the Canaries is one hour ahead of UTC.
    expect(night.starts_at).toBe(`${night.date}T11:00:00.000Z`);
    expect(Date.parse(night.ends_at) - Date.parse(night.starts_at)).toBe(86_400_000);
    expect(night.observers).toEqual([{ id: noor.publicId, name: 'Noor Hathaway' }]);
  });

  it('makes a night of 25 hours when the clocks go back', async () => {
    const night = await openNight(noor, { telescope: 'larkspur', date: '2026-10-24' });
    expect(night.starts_at).toBe('2026-10-24T11:00:00.000Z');
    expect(night.ends_at).toBe('2026-10-25T12:00:00.000Z');
  });

  it('takes the observers that are named instead', async () => {
    const night = await openNight(photometrist, {
      telescope: 'larkspur',
      date: nextDate(),
      observers: [other.publicId],
    });
    expect(night.observers.map(({ name }) => name)).toEqual(['Ilse Brandt']);
  });

  it('refuses the second night of a telescope and date, naming the first and its opener', async () => {
    const night = await openTonight();
    const fault = await faultOf(openNight(other, { telescope: 'larkspur', date: night.date }));
    expect(fault.code).toBe('conflict');
    expect(fault.message).toContain('Noor Hathaway');
    expect(fault.issues[0]?.value).toBe(night.id);
  });

  it('lets one of two win who open the same night at once', async () => {
    const date = nextDate();
    const both = await Promise.allSettled(
      [noor, other].map((who) => openNight(who, { telescope: 'larkspur', date })),
    );
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    const lost = both.find((result) => result.status === 'rejected');
    expect(isFault(lost?.reason, 'conflict')).toBe(true);
  });

  it.each([
    ['a telescope that is not there', 'tulip'],
    ['a retired telescope', 'old-larkspur'],
  ])('refuses %s', async (_, telescope) => {
    const fault = await faultOf(openNight(noor, { telescope, date: nextDate() }));
    expect(fault.code).toBe('invalid-input');
    expect(fault.issues[0]).toMatchObject({ path: 'telescope', value: telescope });
  });

  it('refuses somebody who is no observer as observer', async () => {
    const fault = await faultOf(
      openNight(noor, {
        telescope: 'larkspur',
        date: nextDate(),
        observers: [noor.publicId, stranger.publicId],
      }),
    );
    expect(fault.issues).toEqual([
      { path: 'observers.1', value: stranger.publicId, message: 'is not an observer here' },
    ]);
  });

  it('is not for people without a role at the telescope', async () => {
    expect((await faultOf(openTonight(stranger))).code).toBe('not-allowed');
    expect((await faultOf(openTonight(pi))).code).toBe('not-allowed');
  });

  it('is not for a token that may only read', async () => {
    const reader = await newCaller('Reader', { roles: ['observer'], scopes: ['read'] });
    const fault = await faultOf(openTonight(reader));
    expect(fault.code).toBe('not-allowed');
    expect(fault.message).toContain('only read');
  });
});

describe('closing and opening again', () => {
  it('keeps who closed it, when, and what was said', async () => {
    const night = await openTonight();
    const closed = await closeNight(noor, night.id, { summary: 'Clear.' });
    expect(closed).toMatchObject({
      state: 'closed',
      closed_by: 'Noor Hathaway',
      summary: 'Clear.',
      version: 2,
    });
    expect(Math.abs(Date.parse(closed.closed_at ?? '') - Date.now())).toBeLessThan(60_000);
    const reopened = await reopenNight(noor, night.id, { reason: 'a flat was forgotten' });
    expect(reopened).toMatchObject({
      state: 'open',
      closed_by: null,
      reopened_reason: 'a flat was forgotten',
    });
    const trail = await auditOf(night.id);
    expect(trail.map(({ act }) => act)).toEqual(['night.open', 'night.close', 'night.reopen']);
    expect(trail[2]).toMatchObject({
      reason: 'a flat was forgotten',
      before: { state: 'closed', closed_by: 'Noor Hathaway', closed_at: closed.closed_at },
    });
  });

  it('lets one of two win who close at once; the other is told who did and when', async () => {
    const night = await openTonight();
    const both = await Promise.allSettled([noor, photometrist].map((who) => closeNight(who, night.id, {})));
    const [won] = both.filter((result) => result.status === 'fulfilled');
    const [lost] = both.filter((result) => result.status === 'rejected');
    expect(won?.value.state).toBe('closed');
    expect(isFault(lost?.reason, 'conflict')).toBe(true);
    expect(String((lost?.reason as Fault).message)).toMatch(
      new RegExp(
        `is closed: it was closed by ${won?.value.closed_by} at \\d{4}-\\d\\d-\\d\\d \\d\\d:\\d\\d:\\d\\d UTC`,
      ),
    );
    expect((await auditOf(night.id)).filter(({ act }) => act === 'night.close')).toHaveLength(1);
  });

  it('lets one of many win who open again at once', async () => {
    const night = await openTonight();
    await closeNight(noor, night.id, {});
    const all = await Promise.allSettled(
      Array.from({ length: 6 }, (_, index) =>
        reopenNight(index % 2 === 0 ? noor : photometrist, night.id, { reason: `reason ${index}` }),
      ),
    );
    expect(all.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    expect(
      all.filter((result) => result.status === 'rejected' && isFault(result.reason, 'conflict')),
    ).toHaveLength(5);
  });

  it('opens a calibrated night again', async () => {
    const night = await openTonight();
    await closeNight(noor, night.id, {});
    await execute(`UPDATE nights SET state = 'calibrated' WHERE public_id = :id`, { id: night.id }, null);
    expect((await reopenNight(noor, night.id, { reason: 'wrong filter noted' })).state).toBe('open');
  });

  it('refuses to close a closed night and to open an open one', async () => {
    const night = await openTonight();
    expect((await faultOf(reopenNight(noor, night.id, { reason: 'no reason' }))).code).toBe('conflict');
    await closeNight(noor, night.id, {});
    expect((await faultOf(closeNight(noor, night.id, {}))).code).toBe('conflict');
  });

  it('refuses who has not seen the present version', async () => {
    const night = await openTonight();
    await changeNight(photometrist, night.id, { summary: 'Dew.' });
    const fault = await faultOf(closeNight(noor, night.id, { version: 1 }));
    expect(fault.code).toBe('stale');
    expect(fault.message).toContain('Bram Oyelaran');
    expect(fault.issues).toEqual([{ path: 'version', value: '2', message: 'is the present version' }]);
    expect((await closeNight(noor, night.id, { version: 2 })).state).toBe('closed');
  });

  it('is for the night’s own observers, photometrists and managers', async () => {
    const night = await openTonight();
    expect((await faultOf(closeNight(other, night.id, {}))).code).toBe('not-allowed');
    expect((await faultOf(closeNight(pi, night.id, {}))).code).toBe('not-found');
    expect((await closeNight(photometrist, night.id, {})).closed_by).toBe('Bram Oyelaran');
    expect((await faultOf(reopenNight(other, night.id, { reason: 'just so' }))).code).toBe('not-allowed');
  });
});

describe('changing a night', () => {
  it('keeps the earlier summary and observers in the audit trail', async () => {
    const night = await openTonight();
    await changeNight(noor, night.id, { summary: 'Cirrus.' });
    const changed = await changeNight(noor, night.id, {
      summary: 'Cirrus until 23 UTC.',
      observers: [noor.publicId, other.publicId],
    });
    expect(changed.observers.map(({ name }) => name)).toEqual(['Ilse Brandt', 'Noor Hathaway']);
    expect((await auditOf(night.id)).at(-1)).toMatchObject({
      act: 'night.change',
      before: { summary: 'Cirrus.', observers: [{ name: 'Noor Hathaway' }] },
      after: { summary: 'Cirrus until 23 UTC.' },
    });
    // Now the second observer may close it.
    expect((await closeNight(other, night.id, {})).state).toBe('closed');
  });
});
