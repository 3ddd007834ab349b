import { z } from 'zod';
import { Declination, line, listOf, Page, RightAscension } from '@/lib/contracts/common';
import { operation } from './operation';

const magnitude = (what: string) =>
  z
    .number()
    .nullable()
    .meta({ description: `${what} [mag]` });
const publishedError = (what: string) =>
  z
    .number()
    .nullable()
    .meta({
      description: `Published standard error of ${what}; null where none is published: see default_error [mag]`,
    });

export const Standard = z
  .object({
    name: z.string(),
    field: z.string().meta({ description: 'Group of stars that the star belongs to' }),
    ra: RightAscension,
    dec: Declination,
    pm_ra: z.number().nullable().meta({ description: 'Proper motion, times cos dec [mas per year]' }),
    pm_dec: z.number().nullable().meta({ description: 'Proper motion [mas per year]' }),
    V: z.number(),
    BV: z.number().meta({ description: 'B−V [mag]' }),
    UB: magnitude('U−B'),
    VR: magnitude('V−R'),
    RI: magnitude('R−I'),
    VI: magnitude('V−I; where it is not published the sum of V−R and R−I'),
    e_V: publishedError('V'),
    e_BV: publishedError('B−V'),
    e_UB: publishedError('U−B'),
    e_VR: publishedError('V−R'),
    e_RI: publishedError('R−I'),
    e_VI: publishedError('V−I'),
    default_error: z.number().meta({ description: 'Standard error to use where none is published [mag]' }),
    n: z.number().int().nullable().meta({ description: 'Number of observations behind the values' }),
    usable: z.boolean().meta({ description: 'False: no solve uses the star; `caution` says why' }),
    caution: z.string().meta({ description: 'What to know before use; empty for most' }),
    source: z.string().meta({ description: 'Publication' }),
    separation: z
      .number()
      .nullable()
      .meta({ description: 'From the centre of the search; null without one [deg]' }),
  })
  .meta({ id: 'Standard', description: 'A standard star' });
export type Standard = z.infer<typeof Standard>;

/** A number in an address. An empty one is refused: converted, it would be zero. */
const numberIn = <T extends z.ZodType<number, number>>(schema: T, description: string) =>
  z
    .string()
    .trim()
    .regex(/^[+-]?(\d+\.?\d*|\.\d+)$/, 'must be a number')
    .transform(Number)
    .pipe(schema)
    .optional()
    .meta({ description, override: { type: 'number' } });

const cone = ['ra', 'dec', 'radius'] as const;

export const StandardQuery = Page.extend({
  ra: numberIn(RightAscension, 'Right ascension of the centre of a search, deg J2000'),
  dec: numberIn(Declination, 'Declination of the centre, deg J2000'),
  radius: numberIn(
    z.number().gt(0, 'must be more than 0 deg').max(180, 'must be at most 180 deg'),
    'Radius of the search, deg',
  ),
  field: line(80).optional().meta({ description: 'Name of a field, in any spelling', example: 'SA 95' }),
  name: line(80)
    .optional()
    .meta({ description: 'Part of a star’s name, in any spelling', example: '95 112' }),
}).superRefine((query, context) => {
  const missing = cone.filter((name) => query[name] === undefined);
  if (missing.length === 0 || missing.length === cone.length) return;
  for (const name of missing) {
    const message = 'is needed: a search around a place has ra, dec and radius';
    context.addIssue({ code: 'custom', path: [name], message });
  }
});
export type StandardQuery = z.infer<typeof StandardQuery>;

export const listStandards = operation({
  id: 'listStandards',
  method: 'get',
  path: '/standards',
  tag: 'standards',
  summary: 'Standard stars: all, of a field, by name, or around a place',
  description:
    'Around a place the nearest come first, otherwise they are in the order of right ascension. Distances are on the sphere: across right ascension 0 and around the poles too.',
  query: StandardQuery,
  answer: listOf(Standard),
});
