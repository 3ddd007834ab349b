import { parseDeclination, parseRightAscension } from '@/lib/astro/parse-sexagesimal';

/** A decimal number in text, or null. Hexadecimal, infinity and the like, which `Number` takes, are none. */
export function numberOf(text: string): number | null {
  const value = Number(text);
  if (!Number.isFinite(value) || text === '') return null;
  // A quick look decides nearly always: only 0x…, 0b… and 0o… are finite and no decimal number.
  if (text.charCodeAt(0) !== 48 || text.charCodeAt(1) <= 57 || text.length === 1) return value;
  return /^0[eE.]/.test(text) ? value : null;
}

const instant = /^(\d{4})-(\d\d)-(\d\d)[T ](\d\d):(\d\d):(\d\d)(?:\.(\d{1,9}))?Z?$/i;

/** An instant in UTC as milliseconds since 1970; NaN when it is none. The Z may be missing: the column's name says UTC. */
export function instantOf(text: string): number {
  const parts = instant.exec(text);
  if (!parts) return NaN;
  const [, year, month, day, hour, minute, second, fraction = ''] = parts;
  const [y, mo, d, h, mi, s] = [year, month, day, hour, minute, second].map(Number) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  if (h > 23 || mi > 59 || s > 59) return NaN;
  const whole = Date.UTC(y, mo - 1, d, h, mi, s);
  const date = new Date(whole);
  if (date.getUTCMonth() !== mo - 1 || date.getUTCDate() !== d) return NaN;
  return whole + Math.round(Number(`0.${fraction || '0'}`) * 1000);
}

/** A right ascension or declination in degrees, or what is wrong with it. */
export function angleOf(
  column: 'ra' | 'dec',
  text: string,
): number | { readonly message: string; readonly remedy: string } {
  const isRa = column === 'ra';
  const parsed = isRa ? parseRightAscension(text) : parseDeclination(text);
  if (parsed.ok) return parsed.degrees;
  return {
    message: `This ${parsed.reason}`,
    remedy: isRa
      ? 'Write degrees from 0 to below 360, such as 101.25, or hours as 06:45:00.0.'
      : 'Write degrees from -90 to 90, such as -5.5, or sexagesimal as -05:30:00.0.',
  };
}
