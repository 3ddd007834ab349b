import 'server-only';
import { environment } from '@/lib/server/settings/environment';

const date = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  timeZone: 'UTC',
});

/** The night of a set in words: `3 November 2026, Larkspur 0.8 m`. */
export const nightWords = (set: { readonly nightDate: string; readonly telescopeName: string }): string =>
  `${date.format(new Date(`${set.nightDate}T00:00:00Z`))}, ${set.telescopeName}`;

/** Address of a set's page. */
export const setLink = (set: { readonly publicId: string }): string =>
  `${environment().baseUrl}/measurement-sets/${set.publicId}`;

/** Address of a solution's page. */
export const solutionLink = (solution: { readonly publicId: string }): string =>
  `${environment().baseUrl}/solutions/${solution.publicId}`;
