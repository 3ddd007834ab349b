import 'server-only';
import { observerNames, type ObserverName } from '@/lib/server/data/observer-names';
import type { Caller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';

/** The people whom a night can have as its observers; nobody for those who open no nights. */
export async function possibleObservers(caller: Caller): Promise<readonly ObserverName[]> {
  return may(caller, 'night.open') ? observerNames() : [];
}
