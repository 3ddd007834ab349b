import { z } from 'zod';
import { NightState, TelescopeCode } from '@/lib/contracts/api/night';
import { CalendarDate } from '@/lib/contracts/common';

export type SearchValues = Readonly<Record<string, string | readonly string[] | undefined>>;

/** What the list of nights is narrowed to, as its address says it. What cannot be read is left out. */
export interface NightsQuery {
  readonly telescope?: string;
  readonly state?: NightState;
  readonly from?: string;
  readonly to?: string;
  readonly after?: string;
  /** YYYY-MM of the calendar. */
  readonly month?: string;
}

const schemas = {
  telescope: TelescopeCode,
  state: NightState,
  from: CalendarDate,
  to: CalendarDate,
  after: z.string().max(200),
  month: z.string().regex(/^\d{4}-(0[1-9]|1[0-2])$/),
} as const;

export function nightsQuery(values: SearchValues): NightsQuery {
  const read = Object.entries(schemas).flatMap(([name, schema]) => {
    const parsed = schema.safeParse(values[name]);
    return parsed.success && parsed.data !== '' ? [[name, parsed.data]] : [];
  });
  return Object.fromEntries(read) as NightsQuery;
}

/** The address of a list: the present one with some of it changed; undefined takes a part out. */
export function nightsAddress(
  query: NightsQuery,
  change: Partial<Record<keyof NightsQuery, string | undefined>>,
): string {
  const params = new URLSearchParams();
  for (const [name, value] of Object.entries({ ...query, ...change })) {
    if (value !== undefined) params.set(name, value);
  }
  const search = params.toString();
  return search === '' ? '/nights' : `/nights?${search}`;
}

/** The month so many months on. */
export function shiftMonth(month: string, by: number): string {
  const [year = 0, number = 1] = month.split('-').map(Number);
  return new Date(Date.UTC(year, number - 1 + by, 1)).toISOString().slice(0, 7);
}

/** The weeks of a month, Monday first: dates, and null for days of other months. */
export function weeksOf(month: string): readonly (readonly (string | null)[])[] {
  const [year = 0, number = 1] = month.split('-').map(Number);
  const days = new Date(Date.UTC(year, number, 0)).getUTCDate();
  const lead = (new Date(Date.UTC(year, number - 1, 1)).getUTCDay() + 6) % 7;
  const cells: (string | null)[] = Array.from({ length: lead }, () => null);
  for (let day = 1; day <= days; day += 1) cells.push(`${month}-${String(day).padStart(2, '0')}`);
  while (cells.length % 7 !== 0) cells.push(null);
  return Array.from({ length: cells.length / 7 }, (_, week) => cells.slice(week * 7, week * 7 + 7));
}
