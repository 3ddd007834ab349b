import { beforeEach, describe, expect, it } from 'vitest';
import { SaveTarget } from '@/lib/contracts/programmes';
import { archiveProgramme } from '@/lib/server/acts/archive-programme';
import { changeProgramme } from '@/lib/server/acts/change-programme';
import { createProgramme } from '@/lib/server/acts/create-programme';
import { endProprietaryPeriod } from '@/lib/server/acts/end-proprietary-period';
import { removeProgrammeMember } from '@/lib/server/acts/remove-programme-member';
import { removeTarget } from '@/lib/server/acts/remove-target';
import { saveTarget } from '@/lib/server/acts/save-target';
import { setProgrammeMember } from '@/lib/server/acts/set-programme-member';
import { select } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { programmeList, programmePage } from '@/lib/server/reads/programme-page';
import { faultOf } from '@/tests/support/fault-of';
import { newCaller, newPerson, newProgramme } from '@/tests/support/people';

let count = 0;
let code: string;
let programmeId: number;
let manager: PersonCaller;
let pi: PersonCaller;

const target = { target: '', name: 'LV Marrow', kind: 'star', ra: 83.25, dec: -5.5, note: '' } as const;

beforeEach(async () => {
  code = `T-${(count += 1)}`;
  programmeId = await newProgramme(code);
  manager = await newCaller({ roles: ['manager'] });
  pi = await newCaller({ programmes: { [programmeId]: 'pi' } });
});

describe('a programme', () => {
  it('is added by a manager, once for each code', async () => {
    const programme = { code: `N-${count}`, title: 'New', summary: '', proprietaryMonths: 6 };
    await createProgramme(manager, programme);
    expect((await programmePage(manager, programme.code)).programme).toMatchObject({
      title: 'New',
      proprietaryMonths: 6,
    });
    const fault = await faultOf(createProgramme(manager, programme));
    expect(fault).toMatchObject({ code: 'conflict', issues: [{ path: 'code', message: 'is taken' }] });
  });

  it('is there for its members and the staff, and for nobody else', async () => {
    const stranger = await newCaller({ programmes: { [await newProgramme(`S-${count}`)]: 'pi' } });
    expect((await programmePage(pi, code)).programme.code).toBe(code);
    expect((await faultOf(programmePage(stranger, code))).code).toBe('not-found');
    expect((await programmeList(stranger)).programmes.map((one) => one.code)).toEqual([`S-${count}`]);
    expect((await faultOf(endProprietaryPeriod(stranger, { programme: code }))).code).toBe('not-found');
  });

  it.each([
    [
      'changed',
      () => changeProgramme(pi, { programme: code, title: 'x', summary: '', proprietaryMonths: 1 }),
    ],
    ['archived', () => archiveProgramme(pi, { programme: code, isArchived: true })],
    ['given members', () => setProgrammeMember(pi, { programme: code, person: pi.publicId, role: 'pi' })],
    ['given targets', () => saveTarget(pi, { programme: code, ...target })],
  ])('is not %s by its PI: that is the manager’s', async (_what, act) => {
    expect((await faultOf(act())).code).toBe('not-allowed');
  });

  it('keeps in the audit trail what a change replaced', async () => {
    await changeProgramme(manager, { programme: code, title: 'Better', summary: '', proprietaryMonths: 18 });
    const rows = await select(
      'SELECT before_values AS `before`, after_values AS `after` FROM audit_events WHERE programme_id = :programmeId',
      { programmeId },
    );
    expect(rows).toEqual([
      { before: { title: code, proprietaryMonths: 12 }, after: { title: 'Better', proprietaryMonths: 18 } },
    ]);
  });
});

describe('the investigators of a programme', () => {
  it('always have a PI among them, though two managers take them out at once', async () => {
    const second = await newPerson();
    await setProgrammeMember(manager, { programme: code, person: second.publicId, role: 'pi' });
    const both = await Promise.allSettled([
      removeProgrammeMember(manager, { programme: code, person: second.publicId }),
      removeProgrammeMember(manager, { programme: code, person: pi.publicId }),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    const { members } = await programmePage(manager, code);
    expect(members).toHaveLength(1);
    const [last] = members;
    const demoted = setProgrammeMember(manager, {
      programme: code,
      person: last?.person ?? '',
      role: 'coinvestigator',
    });
    expect((await faultOf(demoted)).code).toBe('conflict');
  });

  it('are refused when there is no such person, and to leave when they are none', async () => {
    const nobody = { programme: code, person: '000000000000' };
    expect((await faultOf(setProgrammeMember(manager, { ...nobody, role: 'pi' }))).code).toBe('not-found');
    expect((await faultOf(removeProgrammeMember(manager, nobody))).code).toBe('not-found');
  });
});

describe('the targets of a programme', () => {
  it('are added, changed under a new name and removed', async () => {
    await saveTarget(manager, { programme: code, ...target });
    await saveTarget(manager, {
      programme: code,
      ...target,
      target: 'lv-marrow',
      name: 'LV Marrow A',
      ra: 0,
    });
    expect((await programmePage(pi, code)).targets).toMatchObject([
      { name: 'LV Marrow A', ra: 0, dec: -5.5 },
    ]);
    await removeTarget(manager, { programme: code, target: 'LV Marrow A' });
    expect((await programmePage(pi, code)).targets).toEqual([]);
    expect((await faultOf(removeTarget(manager, { programme: code, target: 'LV Marrow A' }))).code).toBe(
      'not-found',
    );
  });

  it('differ by more than case, blanks and hyphens', async () => {
    await saveTarget(manager, { programme: code, ...target });
    const fault = await faultOf(saveTarget(manager, { programme: code, ...target, name: 'lv-marrow' }));
    expect(fault).toMatchObject({ code: 'conflict', issues: [{ path: 'name', value: 'lv-marrow' }] });
  });

  it.each([
    ['07:52:14.3', '+22:00:19', 118.05958333, 22.00527778],
    ['118.05958333', '22.00527778', 118.05958333, 22.00527778],
  ])('are placed by %s %s', (ra, dec, expectedRa, expectedDec) => {
    const parsed = SaveTarget.parse({ programme: code, target: '', name: 'x', kind: 'star', ra, dec });
    expect(Math.abs(parsed.ra - expectedRa)).toBeLessThan(1e-8);
    expect(Math.abs(parsed.dec - expectedDec)).toBeLessThan(1e-8);
  });

  it.each([
    ['25:00:00', '+22:00:19', 'ra'],
    ['07:52:14.3', '+92', 'dec'],
    ['', '+22', 'ra'],
  ])('are refused at %s %s, with the field', (ra, dec, path) => {
    const parsed = SaveTarget.safeParse({ programme: code, target: '', name: 'x', kind: 'star', ra, dec });
    expect(parsed.error?.issues.map((issue) => issue.path[0])).toEqual([path]);
  });
});

describe('the proprietary period', () => {
  it('is ended by the PI, once, and by nobody else', async () => {
    const coinvestigator = await newCaller({ programmes: { [programmeId]: 'coinvestigator' } });
    for (const other of [manager, coinvestigator]) {
      expect((await faultOf(endProprietaryPeriod(other, { programme: code }))).code).toBe('not-allowed');
    }
    await endProprietaryPeriod(pi, { programme: code });
    expect((await programmePage(pi, code)).programme.proprietaryEndedAt).toBeInstanceOf(Date);
    expect((await faultOf(endProprietaryPeriod(pi, { programme: code }))).code).toBe('conflict');
  });
});

describe('an archived programme', () => {
  it('can be taken back, and neither twice', async () => {
    await archiveProgramme(manager, { programme: code, isArchived: true });
    expect((await faultOf(archiveProgramme(manager, { programme: code, isArchived: true }))).code).toBe(
      'conflict',
    );
    await archiveProgramme(manager, { programme: code, isArchived: false });
    expect((await programmePage(pi, code)).programme.archivedAt).toBeNull();
  });
});
