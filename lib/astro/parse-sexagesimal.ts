/**
 * Positions as people and files write them. Strict: what could mean two things is refused with the reason, never
 * guessed. Right ascension in parts is hours unless it says degrees; a single number is degrees.
 */

export type ParsedAngle =
  | { readonly ok: true; readonly degrees: number }
  /** The reason is a sentence that can stand behind the column's name in a list of faults. */
  | { readonly ok: false; readonly reason: string };

/** Reads a right ascension.
 * @param text - 12:34:56.7, 12 34 56.7, 12h34m56.7s (hours); 188d44m10s (degrees); 12.58h; 188.736 (degrees)
 * @returns 0 ≤ degrees < 360 [deg], or the reason why not
 * @throws nothing
 * @accuracy rounding
 * @source our own rules */
export function parseRightAscension(text: string): ParsedAngle {
  const read = readParts(text);
  if (!read.ok) return read;
  const inHours = read.unit === 'hours' || (read.unit === 'none' && read.nParts > 1);
  const value = read.magnitude * (inHours ? 15 : 1);
  if (read.isNegative && value !== 0) return refused('is negative; right ascension runs from 0 to 24 hours.');
  if (value >= 360) {
    return refused(
      inHours ? 'is 24 hours or more.' : 'is 360 degrees or more; in hours it would be written 12:34:56.',
    );
  }
  return { ok: true, degrees: value };
}

/** Reads a declination.
 * @param text - −12:34:56.7, +12 34 56, 12d34m56s, 12°34′56″; −12.582 (degrees)
 * @returns −90 ≤ degrees ≤ 90 [deg], or the reason why not
 * @throws nothing
 * @accuracy rounding
 * @source our own rules */
export function parseDeclination(text: string): ParsedAngle {
  const read = readParts(text);
  if (!read.ok) return read;
  if (read.unit === 'hours') return refused('is in hours; declination is in degrees.');
  if (read.magnitude > 90) return refused('lies beyond the pole (more than 90 degrees).');
  return { ok: true, degrees: read.isNegative && read.magnitude > 0 ? -read.magnitude : read.magnitude };
}

type Parts =
  | {
      readonly ok: true;
      readonly isNegative: boolean;
      /** In its own unit, without the sign: −00 00 12 has one, 0 has none. */
      readonly magnitude: number;
      readonly nParts: number;
      readonly unit: 'hours' | 'degrees' | 'none';
    }
  | { readonly ok: false; readonly reason: string };

/** One whole number, then one or two parts of sixty; only the last may have decimals. */
const forms: readonly { readonly unit: 'hours' | 'degrees' | 'none'; readonly pattern: RegExp }[] = [
  { unit: 'none', pattern: /^(\d{1,3}(?:\.\d*)?)$/ },
  { unit: 'hours', pattern: /^(\d{1,3}(?:\.\d*)?)h$/ },
  { unit: 'degrees', pattern: /^(\d{1,3}(?:\.\d*)?)d$/ },
  { unit: 'none', pattern: /^(\d{1,3}):(\d{1,2}(?:\.\d*)?)$/ },
  { unit: 'none', pattern: /^(\d{1,3}):(\d{1,2}):(\d{1,2}(?:\.\d*)?)$/ },
  { unit: 'none', pattern: /^(\d{1,3})\s+(\d{1,2}(?:\.\d*)?)$/ },
  { unit: 'none', pattern: /^(\d{1,3})\s+(\d{1,2})\s+(\d{1,2}(?:\.\d*)?)$/ },
  { unit: 'hours', pattern: /^(\d{1,3})h\s*(\d{1,2}(?:\.\d*)?)m$/ },
  { unit: 'hours', pattern: /^(\d{1,3})h\s*(\d{1,2})m\s*(\d{1,2}(?:\.\d*)?)s?$/ },
  { unit: 'degrees', pattern: /^(\d{1,3})d\s*(\d{1,2}(?:\.\d*)?)m$/ },
  { unit: 'degrees', pattern: /^(\d{1,3})d\s*(\d{1,2})m\s*(\d{1,2}(?:\.\d*)?)s?$/ },
];

function readParts(text: string): Parts {
  const plain = inPlainLetters(text);
  const unsigned = plain.replace(/^[+-]\s*/, '');
  if (unsigned === '') return refused('is empty.');
  for (const { unit, pattern } of forms) {
    const match = pattern.exec(unsigned);
    if (match === null) continue;
    const parts = match.slice(1).map(Number);
    const [whole = NaN, minutes = 0, seconds = 0] = parts;
    if (minutes >= 60) return refused('has 60 minutes or more.');
    if (seconds >= 60) return refused('has 60 seconds or more.');
    const magnitude = whole + (minutes + seconds / 60) / 60;
    return { ok: true, isNegative: plain.startsWith('-'), magnitude, nParts: parts.length, unit };
  }
  return refused(whyNot(unsigned));
}

/** Typographic minus, degree and prime signs become plain letters; case and outer blanks do not count. */
function inPlainLetters(text: string): string {
  return text
    .trim()
    .toLowerCase()
    .replace(/[\u2212\u2010-\u2013]/g, '-')
    .replace(/[°º]/g, 'd')
    .replace(/″|"|''|′′|’’|”/g, 's')
    .replace(/[′'’]/g, 'm');
}

function whyNot(unsigned: string): string {
  if (/[+-]/.test(unsigned)) return 'has a sign that is not at the front.';
  if (/\d,\d/.test(unsigned)) return 'has a comma; decimals are written with a point.';
  if (/[^\d\s.:hdms]/.test(unsigned)) return 'is not a position; write 12:34:56.7 or degrees with decimals.';
  if (/\.\d*[\s:hdms]+\d/.test(unsigned)) return 'has decimals before its last part.';
  if (unsigned.split(/[\s:hdms]+/).filter((part) => part !== '').length > 3)
    return 'has more than three parts.';
  return 'is not a position; write 12:34:56.7 or degrees with decimals.';
}

function refused(reason: string): { readonly ok: false; readonly reason: string } {
  return { ok: false, reason };
}
