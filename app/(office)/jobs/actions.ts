'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { PublicId } from '@/lib/contracts/common';
import { cancelJob } from '@/lib/server/acts/cancel-job';
import { retryJob } from '@/lib/server/acts/retry-job';
import { formAction } from '@/lib/server/http/action';

const JobAlone = z.strictObject({ job: PublicId });

const cancel = formAction(JobAlone, async (caller, { job }) => {
  await cancelJob(caller, job);
  revalidatePath('/jobs');
});
export async function cancelJobAction(former: Awaited<ReturnType<typeof cancel>> | null, form: FormData) {
  return cancel(former, form);
}

const retry = formAction(JobAlone, async (caller, { job }) => {
  await retryJob(caller, job);
  revalidatePath('/jobs');
});
export async function retryJobAction(former: Awaited<ReturnType<typeof retry>> | null, form: FormData) {
  return retry(former, form);
}
