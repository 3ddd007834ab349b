import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { listPeople } from '@/lib/server/data/people';
import {
  membersOf,
  nightsWith,
  programmeByCode,
  programmes,
  targetsOf,
  type MemberRow,
  type ProgrammeNight,
  type ProgrammeRow,
  type TargetRow,
} from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';
import { dataScope, programmeScope } from '@/lib/server/policy/scope';

export interface ProgrammeListed extends ProgrammeRow {
  readonly leads: readonly string[];
  readonly nTargets: number;
}

/** All programmes that the caller may see, those in the archive last. */
export async function programmeList(
  caller: PersonCaller,
): Promise<{ readonly programmes: readonly ProgrammeListed[]; readonly mayManage: boolean }> {
  const rows = await programmes(programmeScope(caller), { limit: 10_000 });
  const ids = rows.map(({ id }) => id);
  const [members, targets] = await Promise.all([membersOf(ids), targetsOf(ids)]);
  const listed = rows.map((row) => ({
    ...row,
    leads: members.filter((one) => one.programmeId === row.id && one.role === 'pi').map(({ name }) => name),
    nTargets: targets.filter(({ programmeId }) => programmeId === row.id).length,
  }));
  return {
    programmes: [...listed].sort((a, b) => Number(a.archivedAt !== null) - Number(b.archivedAt !== null)),
    mayManage: may(caller, 'programme.manage'),
  };
}

export interface ProgrammePage {
  readonly programme: ProgrammeRow;
  readonly members: readonly MemberRow[];
  readonly targets: readonly TargetRow[];
  readonly nights: readonly ProgrammeNight[];
  readonly mayManage: boolean;
  readonly mayEndPeriod: boolean;
  /** People who can become members; empty for those who may not add any. */
  readonly people: readonly { readonly publicId: string; readonly name: string; readonly email: string }[];
}

/** One programme with members, targets and nights. */
export async function programmePage(caller: PersonCaller, code: string): Promise<ProgrammePage> {
  const programme = await programmeByCode(programmeScope(caller), code);
  if (!programme) throw new Fault('not-found', 'There is no such programme.');
  const about = { programmeIds: [programme.id] };
  const mayManage = may(caller, 'programme.manage', about);
  const [members, targets, nights, people] = await Promise.all([
    membersOf([programme.id]),
    targetsOf([programme.id]),
    nightsWith(dataScope(caller), programme.id),
    mayManage ? listPeople() : [],
  ]);
  const known = new Set(members.map(({ person }) => person));
  return {
    programme,
    members,
    targets,
    nights,
    mayManage,
    mayEndPeriod:
      programme.proprietaryEndedAt === null && may(caller, 'release.end-proprietary-period', about),
    people: people
      .filter(({ publicId, state }) => state !== 'disabled' && !known.has(publicId))
      .map(({ publicId, name, email }) => ({ publicId, name, email })),
  };
}
