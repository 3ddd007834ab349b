import type { Route } from 'next';
import type { SetPart } from '@/lib/contracts/set-page';

interface Part {
  readonly part: SetPart;
  readonly after?: string;
  readonly reason?: string | null;
}

/** Address of a part of a set's page. */
export function partAddress(set: string, { part, after, reason }: Part): Route {
  const query = new URLSearchParams({ part });
  if (typeof reason === 'string') query.set('reason', reason);
  if (after !== undefined) query.set('after', after);
  return `/measurement-sets/${set}?${query.toString()}` as Route;
}
