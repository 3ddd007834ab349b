'use server';

import { SeenResults, TransformAgain } from '@/lib/contracts/calibrated-page';
import { markResultsSeen } from '@/lib/server/acts/mark-results-seen';
import { transformAgain } from '@/lib/server/acts/transform-again';
import { action, formAction } from '@/lib/server/http/action';

const mark = action(SeenResults, markResultsSeen);
/** Remembers that the person has opened the results, so that they are no longer new to them. */
export async function markResultsSeenAction(seen: SeenResults) {
  return mark(seen);
}

const again = formAction(TransformAgain, (caller, { solution }) => transformAgain(caller, solution));
/** Queues the transformation of the night's targets anew. */
export async function transformAgainAction(former: Awaited<ReturnType<typeof again>> | null, form: FormData) {
  return again(former, form);
}
