import { z } from 'zod';
import { airmassFormulas } from '@/lib/astro/airmass';
import { coefficientNames } from './coefficients';
import { Band } from './bands';
import { PublicId, Reason } from './common';

export const AirmassFormula = z.enum(airmassFormulas);

export const Coefficient = z.enum(coefficientNames);

const value = z.number().min(-100, 'must be at least −100').max(100, 'must be at most 100');
const error = z.number().gt(0, 'must be above 0').max(100, 'must be at most 100');

/** How a coefficient enters: found, held at a value, or left out of the model. Priors are given apart. */
const TermChoice = z.union([
  z.literal('free'),
  z.literal('none'),
  z.strictObject({ fixed: value.meta({ description: 'The value it is held at' }) }),
]);
const Prior = z.strictObject({ value, error });

/** One observation of a standard: the row of a measurement set. */
export const ObservationId = z
  .string()
  .regex(/^[0-9a-hjkmnp-tv-z]{12}\.[1-9][0-9]{0,9}$/, 'is not an observation: SET.ROW')
  .meta({ description: 'Measurement set and row: SET.ROW', example: '3kq8v7m2t0xc.15' });

export const Exclusion = z.strictObject({
  observation: ObservationId,
  reason: Reason,
  restore: z.boolean().default(false).meta({ description: 'True: kept in, whatever the fit thinks of it' }),
});
export type Exclusion = z.infer<typeof Exclusion>;

export const mostNights = 200;

export const SolveOptions = z
  .strictObject({
    bands: z
      .array(Band)
      .min(1, 'must name a band')
      .refine((names) => new Set(names).size === names.length, 'names a band twice')
      .optional()
      .meta({ description: 'Those that the night has standards in, if you name none' }),
    terms: z
      .partialRecord(Band, z.partialRecord(Coefficient, TermChoice))
      .default({})
      .meta({ description: 'What differs from the usual model, by band and coefficient' }),
    priors: z
      .partialRecord(Band, z.partialRecord(Coefficient, Prior))
      .default({})
      .meta({ description: 'Coefficients that are free with a value known beforehand ± its standard error' }),
    airmass_formula: AirmassFormula.default('young1994'),
    nights: z
      .array(PublicId)
      .max(mostNights - 1, `at most ${mostNights - 1} further nights`)
      .default([])
      .meta({ description: 'Further nights of the same telescope and equipment epoch, solved jointly' }),
    exclusions: z.array(Exclusion).max(10_000).default([]),
  })
  .meta({ id: 'SolveOptions', description: 'Everything may be left out: the usual model then' });
export type SolveOptions = z.output<typeof SolveOptions>;
