import { z } from 'zod';

/** Opaque public id. */
export const PublicId = z
  .string()
  .regex(/^[0-9a-hjkmnp-tv-z]{12}$/, 'is not an id of this service')
  .meta({ description: 'Opaque identifier', example: '3kq8v7m2t0xc' });

/** An id in an address: whatever is no id of ours names nothing, and is not found rather than malformed. */
export const PathId = z
  .string()
  .min(1)
  .max(200)
  .meta({ description: 'Opaque identifier', example: '3kq8v7m2t0xc' });

/** Text of one line, without blanks at its ends. */
export const line = (max: number) =>
  z
    .string()
    .trim()
    .max(max, `must be at most ${max} characters long`)
    .regex(/^[^\p{Cc}\u2028\u2029]*$/u, 'must be one line of text, without control characters');

/** Why a thing is undone: kept in the audit trail. */
export const Reason = line(500)
  .min(3, 'must say why, in a few words')
  .meta({ description: 'Why; kept in the audit trail', example: 'exposure time mistyped' });

/** An instant: ISO 8601, UTC, with Z. */
export const Utc = z.iso
  .datetime({ message: 'must be an instant in UTC such as 2026-11-03T23:41:05Z' })
  .meta({ description: 'Instant, ISO 8601 UTC with Z', example: '2026-11-03T23:41:05.000Z' });

/** A calendar date, for nights the local evening's. */
export const CalendarDate = z.iso.date('must be a date such as 2026-11-03').meta({ example: '2026-11-03' });

export const RightAscension = z
  .number()
  .min(0, 'must be at least 0 deg')
  .lt(360, 'must be below 360 deg')
  .meta({ description: 'Right ascension, deg J2000' });
export const Declination = z
  .number()
  .min(-90, 'must be at least −90 deg')
  .max(90, 'must be at most 90 deg')
  .meta({ description: 'Declination, deg J2000' });

export const Page = z.object({
  after: z.string().max(200).optional().meta({ description: 'Cursor: `next` of the page before' }),
  limit: z.coerce.number().int().min(1).max(1000).default(100),
});
export type Page = z.infer<typeof Page>;

/** The answer's form of every list: `next` is null at the end. */
export const listOf = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), next: z.string().nullable() });
export interface List<T> {
  readonly items: readonly T[];
  readonly next: string | null;
}
