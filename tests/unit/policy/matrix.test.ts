import { describe, expect, it } from 'vitest';
import type { ObservatoryRole, ProgrammeRole } from '@/lib/contracts/roles';
import { isFault, type FaultCode } from '@/lib/faults/fault';
import { tokenScopes, type JobCaller, type PersonCaller, type TokenScope } from '@/lib/server/policy/caller';
import { demand, may, rights, type Right, type Subject } from '@/lib/server/policy/matrix';

const personId = 7;
const ownProgramme = 3;

function callerWith(
  roles: readonly ObservatoryRole[],
  programmes: Readonly<Record<number, ProgrammeRole>> = {},
  scopes: readonly TokenScope[] = tokenScopes,
): PersonCaller {
  return {
    kind: 'person',
    personId,
    publicId: 'aaaaaaaaaaaa',
    name: 'Test',
    email: 'test@evenfall.example',
    roles: new Set(roles),
    programmes: new Map(Object.entries(programmes).map(([id, role]) => [Number(id), role])),
    via: 'session',
    scopes: new Set(scopes),
    requestId: 'test',
  };
}

/** One person a role, and one who has none. */
const people = {
  manager: callerWith(['manager']),
  photometrist: callerWith(['photometrist']),
  observer: callerWith(['observer']),
  pi: callerWith([], { [ownProgramme]: 'pi' }),
  coinvestigator: callerWith([], { [ownProgramme]: 'coinvestigator' }),
  nobody: callerWith([]),
} as const;
type Who = keyof typeof people;
const roles = Object.keys(people) as readonly Who[];

/** What a right may be about: somebody else's things, and one's own in each sense. */
const subjects = {
  foreign: { observerIds: [8], programmeIds: [4], ownerId: 8 },
  'own night': { observerIds: [personId, 8], programmeIds: [4], ownerId: 8 },
  'own programme': { observerIds: [8], programmeIds: [4, ownProgramme], ownerId: 8 },
  'own thing': { observerIds: [8], programmeIds: [4], ownerId: personId },
  nothing: {},
} as const satisfies Record<string, Subject>;
type About = keyof typeof subjects;
const abouts = Object.keys(subjects) as readonly About[];

/** `all`: whatever it is about; a list: about these only; absent: never. */
type Row = Readonly<Partial<Record<Who, 'all' | readonly About[]>>>;
const everybody: Row = {
  manager: 'all',
  photometrist: 'all',
  observer: 'all',
  pi: 'all',
  coinvestigator: 'all',
  nobody: 'all',
};
const ownNight = ['own night'] as const;
const ownProgrammes = ['own programme'] as const;
const own = ['own thing'] as const;
const night: Row = { manager: 'all', photometrist: 'all', observer: ownNight };
const dataOfProgramme: Row = { ...night, pi: ownProgrammes, coinvestigator: ownProgrammes };
const upload: Row = { photometrist: 'all', observer: ownNight, pi: ownProgrammes };
const ownAndProgramme = ['own thing', 'own programme'] as const;
const ownActs: Row = {
  manager: 'all',
  photometrist: own,
  observer: own,
  pi: ownAndProgramme,
  coinvestigator: ownAndProgramme,
  nobody: own,
};
const managers: Row = { manager: 'all' };
const photometrists: Row = { photometrist: 'all' };

/** The access table, written down a second time and independently: the rules must say the same. */
const table = {
  'people.manage': managers,
  'people.see': { manager: 'all', photometrist: 'all' },
  'programme.manage': managers,
  'programme.see': {
    manager: 'all',
    photometrist: 'all',
    observer: 'all',
    pi: ownProgrammes,
    coinvestigator: ownProgrammes,
  },
  'equipment.see': everybody,
  'equipment.manage': { manager: 'all', photometrist: 'all' },
  'site.manage': managers,
  'settings.manage': managers,
  'standards.see': everybody,
  'night.see': {
    manager: 'all',
    photometrist: 'all',
    observer: 'all',
    pi: ownProgrammes,
    coinvestigator: ownProgrammes,
  },
  'night.open': { manager: 'all', photometrist: 'all', observer: 'all' },
  'night.log': night,
  'night.close': night,
  'night.reopen': night,
  'measurements.upload': upload,
  'measurements.refuse': {
    manager: own,
    photometrist: 'all',
    observer: own,
    pi: own,
    coinvestigator: own,
    nobody: own,
  },
  'measurements.see': dataOfProgramme,
  'mapping.save': upload,
  'solution.see': dataOfProgramme,
  'solution.solve': { photometrist: 'all', observer: ownNight },
  'solution.comment': night,
  'solution.exclude': photometrists,
  'solution.propose': photometrists,
  'solution.approve': photometrists,
  'solution.withdraw': photometrists,
  'solution.transform': { manager: 'all', photometrist: 'all' },
  'calibrated.see': dataOfProgramme,
  'release.publish': { photometrist: 'all', pi: ownProgrammes },
  'release.end-proprietary-period': { pi: ownProgrammes },
  'audit.see': ownActs,
  'job.see': ownActs,
  'job.cancel': {
    manager: 'all',
    photometrist: own,
    observer: own,
    pi: own,
    coinvestigator: own,
    nobody: own,
  },
  'job.retry': managers,
  'account.change': everybody,
  'token.make': everybody,
  'token.revoke': {
    manager: 'all',
    photometrist: own,
    observer: own,
    pi: own,
    coinvestigator: own,
    nobody: own,
  },
  'mail.see': managers,
} as const satisfies Record<string, Row>;

const expected = (right: Right, who: Who, about: About): boolean => {
  const cell = (table as Partial<Record<Right, Row>>)[right]?.[who];
  return cell === 'all' || (cell?.includes(about) ?? false);
};

const cells = rights.flatMap((right) =>
  roles.flatMap((who) =>
    abouts.map((about) => ({ right, who, about, allowed: expected(right, who, about) })),
  ),
);

/** The code of the fault that a demand ends with; null when it is met. */
function refusalOf(work: () => void): FaultCode | null {
  try {
    work();
    return null;
  } catch (error) {
    // Anything but a refusal fails the test.
    if (isFault(error)) return error.code;
    throw error;
  }
}

describe('the access matrix', () => {
  it('has a row in this table for every right, and no other', () => {
    expect([...rights].sort()).toEqual(Object.keys(table).sort());
  });

  it.each(cells)('$right by $who on $about: $allowed', ({ right, who, about, allowed }) => {
    expect(may(people[who], right, subjects[about])).toBe(allowed);
    expect(refusalOf(() => demand(people[who], right, subjects[about]))).toBe(allowed ? null : 'not-allowed');
  });

  it.each(rights)('a read-only token of somebody with every role may do no more than look: %s', (right) => {
    const everything = callerWith(['manager', 'photometrist', 'observer'], { [ownProgramme]: 'pi' }, [
      'read',
    ]);
    const subject = { observerIds: [personId], programmeIds: [ownProgramme], ownerId: personId };
    expect(may(everything, right, subject)).toBe(right.endsWith('.see'));
  });

  it.each(rights)('a job acts with the rights of the system: %s', (right) => {
    const job: JobCaller = { kind: 'job', jobId: 'x', personId: null, requestId: 'x' };
    expect(may(job, right)).toBe(true);
  });

  it('adds the rights of several roles up', () => {
    const both = callerWith(['observer'], { [ownProgramme]: 'pi' });
    expect(may(both, 'measurements.upload', subjects['own night'])).toBe(true);
    expect(may(both, 'measurements.upload', subjects['own programme'])).toBe(true);
    expect(may(both, 'measurements.upload', subjects.foreign)).toBe(false);
  });
});
