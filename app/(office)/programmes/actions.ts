'use server';

import { revalidatePath } from 'next/cache';
import {
  ArchiveProgramme,
  ChangeProgramme,
  CreateProgramme,
  ProgrammeAlone,
  RemoveMember,
  RemoveTarget,
  SaveTarget,
  SetMember,
} from '@/lib/contracts/programmes';
import { archiveProgramme } from '@/lib/server/acts/archive-programme';
import { changeProgramme } from '@/lib/server/acts/change-programme';
import { createProgramme } from '@/lib/server/acts/create-programme';
import { endProprietaryPeriod } from '@/lib/server/acts/end-proprietary-period';
import { removeProgrammeMember } from '@/lib/server/acts/remove-programme-member';
import { removeTarget } from '@/lib/server/acts/remove-target';
import { saveTarget } from '@/lib/server/acts/save-target';
import { setProgrammeMember } from '@/lib/server/acts/set-programme-member';
import { formAction } from '@/lib/server/http/action';

const anew = <T>(value: T): T => {
  revalidatePath('/programmes', 'layout');
  return value;
};

const create = formAction(CreateProgramme, async (caller, input) =>
  anew(await createProgramme(caller, input)),
);
export async function createProgrammeAction(
  former: Awaited<ReturnType<typeof create>> | null,
  form: FormData,
) {
  return create(former, form);
}

const change = formAction(ChangeProgramme, async (caller, input) =>
  anew(await changeProgramme(caller, input)),
);
export async function changeProgrammeAction(
  former: Awaited<ReturnType<typeof change>> | null,
  form: FormData,
) {
  return change(former, form);
}

const archive = formAction(ArchiveProgramme, async (caller, input) =>
  anew(await archiveProgramme(caller, input)),
);
export async function archiveProgrammeAction(
  former: Awaited<ReturnType<typeof archive>> | null,
  form: FormData,
) {
  return archive(former, form);
}

const setMember = formAction(SetMember, async (caller, input) =>
  anew(await setProgrammeMember(caller, input)),
);
export async function setMemberAction(former: Awaited<ReturnType<typeof setMember>> | null, form: FormData) {
  return setMember(former, form);
}

const dropMember = formAction(RemoveMember, async (caller, input) =>
  anew(await removeProgrammeMember(caller, input)),
);
export async function removeMemberAction(
  former: Awaited<ReturnType<typeof dropMember>> | null,
  form: FormData,
) {
  return dropMember(former, form);
}

const save = formAction(SaveTarget, async (caller, input) => anew(await saveTarget(caller, input)));
export async function saveTargetAction(former: Awaited<ReturnType<typeof save>> | null, form: FormData) {
  return save(former, form);
}

const drop = formAction(RemoveTarget, async (caller, input) => anew(await removeTarget(caller, input)));
export async function removeTargetAction(former: Awaited<ReturnType<typeof drop>> | null, form: FormData) {
  return drop(former, form);
}

const endPeriod = formAction(ProgrammeAlone, async (caller, input) =>
  anew(await endProprietaryPeriod(caller, input)),
);
export async function endPeriodAction(former: Awaited<ReturnType<typeof endPeriod>> | null, form: FormData) {
  return endPeriod(former, form);
}
