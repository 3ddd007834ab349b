import 'server-only';
import type { NightState } from '@/lib/contracts/api/night';
import { calendarRows } from '@/lib/server/data/nights-calendar';
import type { Caller } from '@/lib/server/policy/caller';
import { nightScope } from '@/lib/server/policy/scope';

export interface CalendarNight {
  readonly id: string;
  readonly telescope: string;
  readonly date: string;
  readonly state: NightState;
  /** That the caller may see. */
  readonly frames: number;
  readonly minutesLost: number;
}

/** Nights of a month that the caller may see, by date and telescope. The month is written YYYY-MM. */
export async function nightsCalendar(
  caller: Caller,
  query: { readonly month: string; readonly telescope?: string | undefined },
): Promise<readonly CalendarNight[]> {
  return calendarRows(nightScope(caller), query);
}
