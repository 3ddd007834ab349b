/** Times as people read them. UTC unless a name says otherwise; no locale of the machine takes part. */

const months = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
] as const;

type Instant = Date | string | number;

function iso(instant: Instant): string {
  return new Date(instant).toISOString();
}

/** `23:41:07`, rounded to the second. */
export function formatClock(instant: Instant): string {
  return iso(Math.round(new Date(instant).getTime() / 1000) * 1000).slice(11, 19);
}

/** `23:41`, rounded to the minute. */
export function formatMinutes(instant: Instant): string {
  return iso(Math.round(new Date(instant).getTime() / 60_000) * 60_000).slice(11, 16);
}

/** `2026-11-03` */
export function formatIsoDate(instant: Instant): string {
  return iso(instant).slice(0, 10);
}

/** `2026-11-03 23:41 UTC` */
export function formatInstant(instant: Instant): string {
  const text = iso(instant);
  return `${text.slice(0, 10)} ${text.slice(11, 16)} UTC`;
}

/** A calendar date, such as a night's, in words: `3 November 2026`. */
export function formatDateInWords(date: string): string {
  const [year, month, day] = date.split('-').map(Number);
  const name = months[(month ?? 0) - 1];
  return year === undefined || name === undefined || day === undefined ? date : `${day} ${name} ${year}`;
}

/** `November 2026` of `2026-11` or any date in it. */
export function formatMonthInWords(month: string): string {
  const [year, number] = month.split('-').map(Number);
  return `${months[(number ?? 0) - 1] ?? month} ${year ?? ''}`.trim();
}

/** `0 h 18 min` */
export function formatDuration(minutes: number): string {
  const whole = Math.round(minutes);
  return `${Math.floor(whole / 60)} h ${String(whole % 60).padStart(2, '0')} min`;
}

/** Time of day at a place: `22:32`. */
export function formatLocalMinutes(instant: Instant, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', {
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZone,
  }).format(new Date(instant));
}
