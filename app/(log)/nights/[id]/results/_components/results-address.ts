import type { Route } from 'next';
import type { CalibratedPageQuery } from '@/lib/contracts/calibrated-page';

type Change = { readonly [Name in keyof CalibratedPageQuery]: CalibratedPageQuery[Name] | undefined };

/** The address of the list: the present one with some of it changed; undefined and false take a part out. */
export function resultsAddress(night: string, query: CalibratedPageQuery, change: Change = {}): Route {
  const params = new URLSearchParams();
  for (const [name, value] of Object.entries({ ...query, ...change })) {
    if (value === true) params.set(name, '1');
    else if (value !== undefined && value !== false) params.set(name, String(value));
  }
  const search = params.toString();
  return `/nights/${night}/results${search === '' ? '' : `?${search}`}` as Route;
}

/** Where the whole result is downloaded: all of its stars, whatever the list is narrowed to. */
export function downloadAddress(
  night: string,
  { programme, solution }: { readonly programme: string | null; readonly solution: string },
  format: 'csv' | 'json',
): string {
  const params = new URLSearchParams({ format, solution });
  if (programme !== null && programme !== '') params.set('programme', programme);
  return `/api/v1/nights/${night}/calibrated?${params.toString()}`;
}
