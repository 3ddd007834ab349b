'use server';

import { SeenResults } from '@/lib/contracts/calibrated-page';
import { markResultsSeen } from '@/lib/server/acts/mark-results-seen';
import { action } from '@/lib/server/http/action';

const mark = action(SeenResults, markResultsSeen);
/** Remembers that the person has opened the results, so that they are no longer new to them. */
export async function markResultsSeenAction(seen: SeenResults) {
  return mark(seen);
}
