import 'server-only';
import type { NightState } from '@/lib/contracts/api/night';
import type { Scope } from '@/lib/server/policy/scope';
import { select } from './database';
import { visibleFrames, visibleNights } from './visible';

interface CalendarRow {
  readonly id: string;
  readonly telescope: string;
  readonly date: string;
  readonly state: NightState;
  readonly frames: number;
  readonly minutesLost: number;
}

/** Nights of a month in the scope, by date and telescope: one statement on the index of dates. */
export async function calendarRows(
  scope: Scope,
  { month, telescope }: { readonly month: string; readonly telescope?: string | undefined },
): Promise<readonly CalendarRow[]> {
  const [nights, frames] = [visibleNights(scope), visibleFrames(scope)];
  return select<CalendarRow>(
    `SELECT n.public_id AS id, t.code AS telescope, DATE_FORMAT(n.date, '%Y-%m-%d') AS date, n.state,
            (SELECT COUNT(*) FROM frames f WHERE f.night_id = n.id AND ${frames.sql}) AS frames,
            CAST((SELECT COALESCE(SUM(l.minutes), 0) FROM time_losses l WHERE l.night_id = n.id) AS INT) AS minutesLost
       FROM nights n JOIN telescopes t ON t.id = n.telescope_id
      WHERE n.date >= :first AND n.date < :first + INTERVAL 1 MONTH
        AND (:telescope IS NULL OR t.code = :telescope) AND ${nights.sql}
      ORDER BY n.date, t.code`,
    { ...nights.values, ...frames.values, first: `${month}-01`, telescope: telescope ?? null },
  );
}
