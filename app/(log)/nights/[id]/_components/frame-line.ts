import { parseDeclination, parseRightAscension, type ParsedAngle } from '@/lib/astro/parse-sexagesimal';
import { FrameInput, frameFaultsInNight, type Frame, type NextFrame } from '@/lib/contracts/api/frame';
import { bands, frameTypes } from '@/lib/contracts/bands';
import { instantInNight } from '@/lib/contracts/night-clock';
import type { NightLog } from '@/lib/contracts/night-log';

/** A frame as it is typed: text in every field. */
export interface FrameLine {
  readonly number: string;
  readonly type: string;
  readonly object: string;
  readonly band: string;
  /** UTC; empty is now, where now is in the night. */
  readonly start: string;
  readonly exposure: string;
  readonly comment: string;
  readonly file: string;
  readonly programme: string;
  readonly ra: string;
  readonly dec: string;
  readonly fwhm: string;
  readonly sky: string;
}
export type LineField = keyof FrameLine;
export type LineFaults = Readonly<Partial<Record<LineField, string>>>;

export type ReadLine =
  { readonly ok: true; readonly input: FrameInput } | { readonly ok: false; readonly faults: LineFaults };

const blank: FrameLine = {
  number: '',
  type: '',
  object: '',
  band: '',
  start: '',
  exposure: '',
  comment: '',
  file: '',
  programme: '',
  ra: '',
  dec: '',
  fwhm: '',
  sky: '',
};

const text = (value: number | string | null | undefined): string =>
  value === null || value === undefined ? '' : String(value);

/** A new line from what the next frame probably is. */
export function proposedLine({ number, type, object, band, exposure }: NextFrame): FrameLine {
  return { ...blank, number: text(number), type, object, band: text(band), exposure: text(exposure) };
}

/** A line that says again what a frame, or a refused entry, said. */
export function lineOf(frame: Frame | FrameInput): FrameLine {
  return {
    number: text(frame.number),
    type: frame.type,
    object: frame.object,
    band: text(frame.band),
    start: new Date(frame.utc_start).toISOString().slice(11, 23).replace('.000', ''),
    exposure: text(frame.exposure),
    comment: frame.comment,
    file: text(frame.file),
    programme: text(frame.programme),
    ra: text(frame.ra),
    dec: text(frame.dec),
    fwhm: text(frame.fwhm),
    sky: text(frame.sky),
  };
}

/** The one word that a text is, or begins alone. */
export function wordOf<W extends string>(words: readonly W[], typed: string): W | null {
  const start = typed.trim().toLowerCase();
  const exact = words.find((word) => word.toLowerCase() === start);
  if (exact !== undefined || start === '') return exact ?? null;
  const begun = words.filter((word) => word.toLowerCase().startsWith(start));
  return begun.length === 1 ? (begun[0] ?? null) : null;
}

/** Reads a figure as people type it: a true minus sign is one, a decimal comma is not. */
export function readFigure(typed: string): number | null {
  const plain = typed.trim().replace('−', '-');
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : null;
}

/** Collects what is wrong while values are read one by one. */
function reader(line: FrameLine) {
  const faults: Partial<Record<LineField, string>> = {};
  const figure = (field: LineField): number | undefined => {
    if (line[field].trim() === '') return undefined;
    const value = readFigure(line[field]);
    if (value === null) faults[field] = 'is not a number: write 12.5';
    return value ?? undefined;
  };
  const angle = (field: 'ra' | 'dec', parse: (typed: string) => ParsedAngle): number | undefined => {
    if (line[field].trim() === '') return undefined;
    const parsed = parse(line[field]);
    if (!parsed.ok) faults[field] = parsed.reason;
    return parsed.ok ? parsed.degrees : undefined;
  };
  const given = (field: LineField): string | undefined => {
    const value = line[field].trim();
    return value === '' ? undefined : value;
  };
  return { faults, figure, angle, given };
}

const fieldOfPath: Readonly<Record<string, LineField>> = { utc_start: 'start' };

function asField(path: PropertyKey | undefined): LineField {
  const name = String(path);
  return fieldOfPath[name] ?? (name in blank ? (name as LineField) : 'comment');
}

interface Reading {
  readonly night: NightLog['night'];
  readonly telescope: NightLog['telescope'];
  /** ms; stands in for an empty start. Null where a start must be written. */
  readonly now: number | null;
}

function typeAndBand(line: FrameLine, faults: Partial<Record<LineField, string>>) {
  const type = wordOf(frameTypes, line.type);
  if (type === null) {
    faults.type = line.type.trim() === '' ? 'is needed' : `is none of ${frameTypes.join(', ')}`;
  }
  const band = wordOf(bands, line.band);
  if (band === null && line.band.trim() !== '') faults.band = `is none of ${bands.join(', ')}`;
  return { type, band };
}

/** The frame that a line says, by the rules of the interface that takes it; or what is wrong, field by field. */
export function readLine(line: FrameLine, { night, telescope, now }: Reading): ReadLine {
  const { faults, figure, angle, given } = reader(line);
  const { type, band } = typeAndBand(line, faults);
  const start =
    line.start.trim() === '' && now !== null
      ? { ok: true as const, utc: new Date(Math.floor(now / 1000) * 1000).toISOString() }
      : instantInNight(line.start, night);
  if (!start.ok) faults.start = start.reason;
  const number = figure('number');
  const exposure = type === 'bias' ? (figure('exposure') ?? 0) : figure('exposure');
  if (exposure === undefined) faults.exposure ??= 'is needed';
  const told = {
    number,
    type,
    object: line.object,
    band,
    utc_start: start.ok ? start.utc : '',
    exposure,
    comment: line.comment,
    file: given('file'),
    programme: given('programme'),
    ra: angle('ra', parseRightAscension),
    dec: angle('dec', parseDeclination),
    fwhm: figure('fwhm'),
    sky: figure('sky'),
  };
  if (Object.keys(faults).length > 0) return { ok: false, faults };
  const parsed = FrameInput.safeParse(told);
  if (!parsed.success) {
    for (const { path, message } of parsed.error.issues) faults[asField(path[0])] ??= message;
    return { ok: false, faults };
  }
  const bounds = {
    ...night,
    telescope: telescope.name,
    bands: telescope.filters.map((filter) => filter.band),
  };
  for (const [path, message] of frameFaultsInNight(parsed.data, bounds)) faults[asField(path)] ??= message;
  return Object.keys(faults).length > 0 ? { ok: false, faults } : { ok: true, input: parsed.data };
}

/** Faults that the server found, beside their fields. */
export function faultsOf(issues: readonly { readonly path: string; readonly message: string }[]): LineFaults {
  const faults: Partial<Record<LineField, string>> = {};
  for (const { path, message } of issues) faults[asField(path)] ??= message;
  return faults;
}
