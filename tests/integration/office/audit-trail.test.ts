import { beforeEach, describe, expect, it } from 'vitest';
import { recordAudit } from '@/lib/server/data/audit';
import { execute, inTransaction } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { auditTrail } from '@/lib/server/reads/audit-trail';
import { newCaller, newProgramme } from '@/tests/support/people';

const act = (caller: PersonCaller, subjectId: string, programmeId: number | null = null) =>
  inTransaction((tx) =>
    recordAudit(tx, caller, {
      act: 'remark.correct',
      subjectKind: 'remark',
      subjectId,
      programmeId,
      before: { text: 'clear' },
      after: { text: 'thin cloud' },
      reason: 'saw it late',
    }),
  );
const subjects = (trail: { rows: readonly { subjectId: string }[] }) =>
  trail.rows.map(({ subjectId }) => subjectId);

describe('the audit trail', () => {
  beforeEach(async () => {
    await execute('DELETE FROM audit_events', {}, null);
  });

  it('shows a manager everything, the latest first, with the values before and after', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    const observer = await newCaller({ roles: ['observer'] });
    await act(observer, 'first');
    await act(observer, 'second');
    const trail = await auditTrail(manager, {});
    expect(subjects(trail)).toEqual(['second', 'first']);
    expect(trail.rows[0]).toMatchObject({
      person: observer.name,
      reason: 'saw it late',
      before: { text: 'clear' },
      after: { text: 'thin cloud' },
    });
  });

  it('shows others what they did themselves and what was done in their programmes, nothing else', async () => {
    const programme = await newProgramme(`A-${Date.now()}`);
    const observer = await newCaller({ roles: ['observer'] });
    const photometrist = await newCaller({ roles: ['photometrist'] });
    const pi = await newCaller({ programmes: { [programme]: 'pi' } });
    await act(observer, 'by the observer');
    await act(photometrist, 'in the programme', programme);
    expect(subjects(await auditTrail(observer, {}))).toEqual(['by the observer']);
    expect(subjects(await auditTrail(photometrist, {}))).toEqual(['in the programme']);
    expect(subjects(await auditTrail(pi, {}))).toEqual(['in the programme']);
  });

  it('narrows to a person, a subject and dates', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    const observer = await newCaller({ roles: ['observer'] });
    await act(observer, 'old');
    await execute("UPDATE audit_events SET utc = '2026-01-05 23:59:59.900'", {}, null);
    await act(manager, 'new');
    expect(subjects(await auditTrail(manager, { person: observer.publicId }))).toEqual(['old']);
    expect(subjects(await auditTrail(manager, { subject: 'new' }))).toEqual(['new']);
    expect(subjects(await auditTrail(manager, { from: '2026-01-05', to: '2026-01-05' }))).toEqual(['old']);
    expect(subjects(await auditTrail(manager, { to: '2026-01-04' }))).toEqual([]);
    expect(subjects(await auditTrail(manager, { about: 'night' }))).toEqual([]);
  });

  it('runs on by cursor without losing or repeating a row', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    for (let i = 0; i < 205; i += 1) await act(manager, `row ${i}`);
    const seen: string[] = [];
    let after: string | undefined;
    do {
      const trail = await auditTrail(manager, after === undefined ? {} : { after });
      seen.push(...subjects(trail));
      after = trail.next ?? undefined;
    } while (after !== undefined);
    expect(seen).toEqual(Array.from({ length: 205 }, (_, i) => `row ${204 - i}`));
  });
});
