'use server';

import { revalidatePath } from 'next/cache';
import {
  ChangeCamera,
  ChangeEpoch,
  ChangeFilters,
  ChangeSite,
  ChangeTelescope,
} from '@/lib/contracts/equipment';
import { saveCamera } from '@/lib/server/acts/save-camera';
import { saveEpoch } from '@/lib/server/acts/save-epoch';
import { saveSite } from '@/lib/server/acts/save-site';
import { saveTelescope } from '@/lib/server/acts/save-telescope';
import { setFilters } from '@/lib/server/acts/set-filters';
import { formAction } from '@/lib/server/http/action';

const anew = <T>(value: T): T => {
  // The bar's clocks follow the site.
  revalidatePath('/', 'layout');
  return value;
};

const site = formAction(ChangeSite, async (caller, input) => anew(await saveSite(caller, input)));
export async function saveSiteAction(former: Awaited<ReturnType<typeof site>> | null, form: FormData) {
  return site(former, form);
}

const telescope = formAction(ChangeTelescope, async (caller, input) =>
  anew(await saveTelescope(caller, input)),
);
export async function saveTelescopeAction(
  former: Awaited<ReturnType<typeof telescope>> | null,
  form: FormData,
) {
  return telescope(former, form);
}

const camera = formAction(ChangeCamera, async (caller, input) => anew(await saveCamera(caller, input)));
export async function saveCameraAction(former: Awaited<ReturnType<typeof camera>> | null, form: FormData) {
  return camera(former, form);
}

const filters = formAction(ChangeFilters, async (caller, input) => anew(await setFilters(caller, input)));
export async function setFiltersAction(former: Awaited<ReturnType<typeof filters>> | null, form: FormData) {
  return filters(former, form);
}

const epoch = formAction(ChangeEpoch, async (caller, input) => anew(await saveEpoch(caller, input)));
export async function saveEpochAction(former: Awaited<ReturnType<typeof epoch>> | null, form: FormData) {
  return epoch(former, form);
}
