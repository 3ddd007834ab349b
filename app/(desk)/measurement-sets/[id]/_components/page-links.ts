import type { Route } from 'next';

/** Addresses of a list's beginning and of what follows; null where there is no need of them. */
export interface PageLinks {
  readonly first: Route | null;
  readonly next: Route | null;
}
