import type { ObjectName } from '@/lib/contracts/api/object-name';
import { bands, type Band, type FrameType } from '@/lib/contracts/bands';
import { starKey } from '@/lib/contracts/star-name';
import type { FitsValue } from '@/lib/formats/fits-header';
import type { LogFilter } from '@/lib/contracts/night-log';
import type { FrameLine } from './frame-line';

/** What a header is read against. */
export interface HeaderContext {
  readonly filters: readonly LogFilter[];
  readonly objects: readonly ObjectName[];
}

type Values = ReadonlyMap<string, FitsValue>;

function first(values: Values, keywords: readonly string[]): FitsValue {
  for (const keyword of keywords) {
    const value = values.get(keyword);
    if (value !== undefined && value !== null && value !== '') return value;
  }
  return null;
}

const text = (value: FitsValue) => (value === null ? '' : String(value).trim());

/** Words that instruments write for the type of a frame, by what they begin with. */
const typeWords: readonly (readonly [RegExp, FrameType])[] = [
  [/^(bias|zero)/i, 'bias'],
  [/^dark/i, 'dark'],
  [/flat/i, 'flat'],
  [/^focus/i, 'focus'],
  [/^test/i, 'test'],
  [/^standard/i, 'standard'],
];

function typeOf(values: Values, known: ObjectName | undefined): FrameType {
  const word = text(first(values, ['IMAGETYP', 'OBSTYPE', 'IMAGETYPE', 'FRAMETYP']));
  const named = typeWords.find(([pattern]) => pattern.test(word));
  return named?.[1] ?? (known?.kind === 'standard field' ? 'standard' : 'target');
}

/** The band of a filter's name: the telescope's own name for it, or a word in it that is a band's letter. */
export function bandOf(name: string, filters: readonly LogFilter[]): Band | null {
  const own = filters.find((filter) => filter.name.toLowerCase() === name.trim().toLowerCase());
  if (own !== undefined) return own.band;
  const words = name.split(/[^A-Za-z]+/);
  return bands.find((band) => words.includes(band)) ?? null;
}

/** The start in UTC, in full; empty when the header's times are in another scale, or in parts that do not fit. */
function startOf(values: Values): string {
  const scale = text(first(values, ['TIMESYS']));
  if (scale !== '' && scale.toUpperCase() !== 'UTC') return '';
  const date = text(first(values, ['DATE-OBS', 'DATE-BEG']));
  if (date.includes('T')) return `${date.replace(/z$/i, '').slice(0, 23)}Z`;
  const time = text(first(values, ['TIME-OBS', 'UTC-OBS', 'UT', 'UTC', 'UTSTART']));
  return /^\d{4}-\d{2}-\d{2}$/.test(date) && time !== '' ? `${date}T${time.slice(0, 12)}Z` : '';
}

/** A frame as a FITS header tells it. What the header does not say stays empty, for the person to see and fill. */
export function headerLine(values: Values, file: string, { filters, objects }: HeaderContext): FrameLine {
  const object = text(first(values, ['OBJECT', 'OBJNAME']));
  const known = objects.find(({ name }) => starKey(name) === starKey(object));
  const type = typeOf(values, known);
  const isSky = type === 'standard' || type === 'target' || type === 'focus' || type === 'test';
  // A known object has its place in the log; the header's is where the telescope happened to point.
  const placed = isSky && known === undefined;
  return {
    number: '',
    type,
    object: isSky ? (known?.name ?? object) : '',
    band: bandOf(text(first(values, ['FILTER', 'FILTER1', 'FILTNAM', 'BAND'])), filters) ?? '',
    start: startOf(values),
    exposure: text(first(values, ['EXPTIME', 'EXPOSURE', 'XPOSURE'])),
    comment: '',
    file,
    programme: '',
    ra: placed ? text(first(values, ['RA', 'OBJCTRA'])) : '',
    dec: placed ? text(first(values, ['DEC', 'OBJCTDEC'])) : '',
    fwhm: '',
    sky: '',
  };
}
