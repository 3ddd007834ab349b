/**
 * A night runs from local noon to the next local noon and is named by its evening date. Local time is that of the
 * site's IANA time zone, daylight saving and past changes of the zone included.
 */
import { msPerDay } from './julian-date';

export interface NightBounds {
  /** First instant at or after local noon of the evening date. [ms since 1970-01-01T00:00:00Z] */
  readonly start: number;
  /** First instant at or after the next local noon; belongs to the next night. [ms since 1970-01-01T00:00:00Z] */
  readonly end: number;
}

/** Bounds of the night that is named by an evening date.
 * @param date - local evening date, YYYY-MM-DD
 * @param timezone - IANA name, for example Atlantic/Canary
 * @returns start and end; 23, 24 or 25 hours apart as daylight saving asks [ms since 1970-01-01T00:00:00Z]
 * @throws {RangeError} no such date, or unknown time zone
 * @accuracy exact, by the time zone data of the machine
 * @source IANA time zone database, through Intl (ECMA-402) */
export function nightBounds(date: string, timezone: string): NightBounds {
  const midnight = parseDate(date);
  return {
    start: utcOfWallTime(midnight + msPerDay / 2, timezone),
    end: utcOfWallTime(midnight + 1.5 * msPerDay, timezone),
  };
}

/** The night that an instant belongs to.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z]
 * @param timezone - IANA name
 * @returns local evening date, YYYY-MM-DD; noon itself begins a new night
 * @throws {RangeError} instant not finite, or unknown time zone
 * @accuracy exact, by the time zone data of the machine
 * @source IANA time zone database, through Intl (ECMA-402) */
export function nightOf(utc: number, timezone: string): string {
  return new Date(wallTime(utc, timezone) - msPerDay / 2).toISOString().slice(0, 10);
}

/** What clocks on the wall show, written as if it were UTC.
 * @param utc - instant [ms since 1970-01-01T00:00:00Z]
 * @param timezone - IANA name
 * @returns local date and time as milliseconds since 1970-01-01T00:00:00 local [ms]
 * @throws {RangeError} instant not finite, or unknown time zone
 * @accuracy exact, by the time zone data of the machine
 * @source IANA time zone database, through Intl (ECMA-402) */
export function wallTime(utc: number, timezone: string): number {
  if (!Number.isFinite(utc))
    throw new RangeError(`An instant must be a finite number of milliseconds, not ${utc}.`);
  const fields: Record<string, number> = {};
  for (const part of clockOf(timezone).formatToParts(utc)) {
    if (part.type !== 'literal') fields[part.type] = Number(part.value);
  }
  const field = (name: string): number => fields[name] ?? NaN;
  const wholeSeconds = Date.UTC(
    field('year'),
    field('month') - 1,
    field('day'),
    field('hour'),
    field('minute'),
    field('second'),
  );
  return wholeSeconds + (((utc % 1000) + 1000) % 1000);
}

/** First instant at which the wall clock shows a time or, where clocks skip it, a later one. */
function utcOfWallTime(wall: number, timezone: string): number {
  const offsetBefore = wallTime(wall - msPerDay, timezone) - (wall - msPerDay);
  const offsetAfter = wallTime(wall + msPerDay, timezone) - (wall + msPerDay);
  const candidates = [wall - offsetBefore, wall - offsetAfter].sort((a, b) => a - b);
  const [early = NaN, late = NaN] = candidates;
  if (wallTime(early, timezone) === wall) return early;
  // The clocks change within a day of it, or jump over it (a zone that crossed the date line skips a whole day).
  let [before, after] = [early - 1, late];
  while (after - before > 1) {
    const middle = Math.floor((before + after) / 2);
    if (wallTime(middle, timezone) >= wall) after = middle;
    else before = middle;
  }
  return after;
}

/** Making a formatter costs fifty times as much as using it. */
const clocks = new Map<string, Intl.DateTimeFormat>();

function clockOf(timezone: string): Intl.DateTimeFormat {
  const known = clocks.get(timezone);
  if (known !== undefined) return known;
  const clock = newClock(timezone);
  clocks.set(timezone, clock);
  return clock;
}

function newClock(timezone: string): Intl.DateTimeFormat {
  try {
    return new Intl.DateTimeFormat('en-u-ca-gregory-nu-latn', {
      timeZone: timezone,
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
    });
  } catch (error) {
    // Intl's own message names neither the field nor the remedy.
    throw new RangeError(
      `"${timezone}" is not a time zone of the IANA database (for example Atlantic/Canary).`,
      {
        cause: error,
      },
    );
  }
}

function parseDate(date: string): number {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(date);
  const [, year, month, day] = match ?? [];
  const midnight = match === null ? NaN : Date.UTC(Number(year), Number(month) - 1, Number(day));
  if (!Number.isFinite(midnight) || new Date(midnight).toISOString().slice(0, 10) !== date) {
    throw new RangeError(`"${date}" is not a date of the calendar, written YYYY-MM-DD.`);
  }
  return midnight;
}
