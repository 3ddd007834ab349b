import { z } from 'zod';
import { CalendarDate, PublicId } from '@/lib/contracts/common';
import { NightParams } from './night';
import { operation } from './operation';

export const calibratedFormats = ['json', 'csv'] as const;

const figure = z.number().nullable();
const count = z.number().int();

/** A row of calibrated magnitudes. Null where a quantity could not be had. */
export const CalibratedStar = z
  .object({
    star: z.string(),
    ra: figure.meta({ description: 'deg J2000' }),
    dec: figure,
    n_U: count,
    n_B: count.meta({ description: 'Measurements used in B' }),
    n_V: count,
    n_R: count,
    n_I: count,
    V: figure,
    V_random: figure.meta({ description: 'Falls as measurements are averaged' }),
    V_systematic: figure.meta({ description: 'From the coefficients, common to the night' }),
    V_total: figure,
    B: figure,
    B_random: figure,
    B_systematic: figure,
    B_total: figure,
    BV: figure,
    BV_random: figure,
    BV_systematic: figure,
    BV_total: figure,
    UB: figure,
    UB_random: figure,
    UB_systematic: figure,
    UB_total: figure,
    VR: figure,
    VR_random: figure,
    VR_systematic: figure,
    VR_total: figure,
    VI: figure,
    VI_random: figure,
    VI_systematic: figure,
    VI_total: figure,
    bjd_tdb: figure.meta({ description: 'Mean mid-exposure, BJD in TDB, days' }),
    airmass: figure.meta({ description: 'Mean of the measurements used' }),
    flags: z.array(z.string()).meta({ description: 'Cautions by name' }),
    programme: z.string(),
    solution: PublicId,
    night: CalendarDate,
  })
  .meta({ id: 'CalibratedStar' });
export type CalibratedStar = z.infer<typeof CalibratedStar>;

export const CalibratedQuery = z.object({
  programme: z
    .string()
    .max(40)
    .optional()
    .meta({ description: 'Code of the programme; all that you may see, if you name none' }),
  solution: z
    .string()
    .max(40)
    .optional()
    .meta({ description: 'An earlier, superseded solution of the night instead of the approved one' }),
  format: z.enum(calibratedFormats).default('json'),
});
export type CalibratedQuery = z.output<typeof CalibratedQuery>;

export const downloadCalibrated = operation({
  id: 'downloadCalibrated',
  method: 'get',
  path: '/nights/{id}/calibrated',
  tag: 'calibrated magnitudes',
  summary: 'Calibrated magnitudes of a night, streamed',
  description:
    'Begins with its provenance: as lines with # before a CSV table, or as `provenance` beside `items` in JSON. The SHA-256 of the data rows is part of it. VOTable and FITS are not offered yet. In measurement tables the words saturated, saturation, sat and nonlinear of the flag column count as saturation; bad, reject, rejected, exclude and excluded leave a measurement out.',
  params: NightParams,
  query: CalibratedQuery,
  stream: ['application/json', 'text/csv'],
  faults: ['conflict'],
});
