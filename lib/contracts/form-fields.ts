import { z } from 'zod';

/** Fields of forms, which come as text: what cannot be read is said, never guessed. */

interface Limits {
  readonly min: number;
  readonly max: number;
  /** Stands behind the figures in refusals; none for pure numbers. */
  readonly unit?: string;
  readonly whole?: boolean;
}

const written = (value: number): string => String(value).replace('-', '−');

/** A figure as people type it: a true minus sign is one too; a decimal comma is refused by name. */
function read(text: string, { min, max, unit = '', whole = false }: Limits): number | string {
  const plain = text.trim().replaceAll('−', '-');
  if (plain === '') return 'is missing';
  if (/^[+-]?\d+,\d+$/.test(plain)) return 'has a decimal comma; write a point';
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain)) return 'is not a number';
  const value = Number(plain);
  if (whole && !Number.isInteger(value)) return 'must be a whole number';
  if (value < min || value > max) {
    return `must be from ${written(min)} to ${written(max)}${unit === '' ? '' : ` ${unit}`}`;
  }
  return value;
}

/** A figure within limits. */
export const figure = (limits: Limits) =>
  z.string().transform((text, context) => {
    const value = read(text, limits);
    if (typeof value === 'number') return value;
    context.addIssue({ code: 'custom', message: value });
    return z.NEVER;
  });

/** The same, or null when the field is left empty. */
export const optionalFigure = (limits: Limits) =>
  z
    .string()
    .optional()
    .transform((text, context) => {
      if (text === undefined || text.trim() === '') return null;
      const value = read(text, limits);
      if (typeof value === 'number') return value;
      context.addIssue({ code: 'custom', message: value });
      return z.NEVER;
    });

const calendarDate = z.iso.date();

/** A date, or null when the field is left empty. */
export const optionalDate = z
  .string()
  .optional()
  .transform((text, context) => {
    if (text === undefined || text.trim() === '') return null;
    const parsed = calendarDate.safeParse(text.trim());
    if (parsed.success) return parsed.data;
    context.addIssue({ code: 'custom', message: 'must be a date such as 2026-11-03' });
    return z.NEVER;
  });

/** A tick box: sent when it is ticked, absent when not. */
export const tick = z
  .string()
  .optional()
  .transform((value) => value !== undefined);

/** Text of some paragraphs, which may be empty. */
export const paragraphs = (max: number) =>
  z
    .string()
    .optional()
    .transform((text) => (text ?? '').replaceAll('\r\n', '\n').trim())
    .pipe(z.string().max(max, `must be at most ${max} characters long`));
