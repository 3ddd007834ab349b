import { z } from 'zod';
import { line, listOf, Page, PathId, PublicId, Reason, Utc } from '@/lib/contracts/common';
import { NightParams } from './night';
import { operation } from './operation';

/** Most entries that one call takes: a sensor's night, every ten seconds. */
export const maxConditionsPerCall = 5000;

const readings = {
  cloud: z
    .number()
    .int('must be a whole number of eighths')
    .min(0, 'must be 0 to 8 eighths')
    .max(8, 'must be 0 to 8 eighths')
    .nullish()
    .meta({ description: 'Cloud, eighths of the sky' }),
  seeing: z
    .number()
    .gt(0, 'must be above 0″')
    .max(60, 'must be at most 60″')
    .nullish()
    .meta({ description: 'arcsec' }),
  humidity: z
    .number()
    .min(0, 'must be 0 to 100 %')
    .max(100, 'must be 0 to 100 %')
    .nullish()
    .meta({ description: '%' }),
  wind: z
    .number()
    .min(0, 'must be at least 0 m/s')
    .max(120, 'must be at most 120 m/s')
    .nullish()
    .meta({ description: 'm/s' }),
  wind_direction: z
    .number()
    .int('must be a whole number of degrees')
    .min(0, 'must be at least 0°')
    .max(359, 'must be below 360°')
    .nullish()
    .meta({ description: 'Where it blows from, deg from north through east' }),
  temperature: z
    .number()
    .min(-90, 'must be at least −90 °C')
    .max(60, 'must be at most 60 °C')
    .nullish()
    .meta({ description: '°C' }),
  sky_brightness: z
    .number()
    .min(5, 'must be at least 5 mag per square arcsec')
    .max(30, 'must be at most 30 mag per square arcsec')
    .nullish()
    .meta({ description: 'mag per square arcsec' }),
};
const readingNames = Object.keys(readings) as (keyof typeof readings)[];

export const ConditionInput = z
  .strictObject({
    utc: Utc.meta({ description: 'When, within the night’s noon to noon' }),
    ...readings,
    comment: line(500).default(''),
  })
  .refine((entry) => entry.comment !== '' || readingNames.some((name) => (entry[name] ?? null) !== null), {
    message: 'An entry needs at least one reading or a comment.',
  })
  .meta({
    id: 'ConditionInput',
    example: { utc: '2026-11-03T23:30:00Z', cloud: 1, seeing: 1.4, humidity: 38 },
  });
export type ConditionInput = z.infer<typeof ConditionInput>;

export const ConditionsInput = z
  .array(ConditionInput)
  .min(1, 'must hold at least one entry')
  .max(maxConditionsPerCall, 'must hold at most 5,000 entries');

export const Condition = z
  .object({
    id: PublicId,
    utc: Utc,
    cloud: z.number().int().nullable().meta({ description: 'eighths' }),
    seeing: z.number().nullable().meta({ description: 'arcsec' }),
    humidity: z.number().nullable().meta({ description: '%' }),
    wind: z.number().nullable().meta({ description: 'm/s' }),
    wind_direction: z.number().int().nullable().meta({ description: 'deg, where it blows from' }),
    temperature: z.number().nullable().meta({ description: '°C' }),
    sky_brightness: z.number().nullable().meta({ description: 'mag per square arcsec' }),
    comment: z.string(),
    recorded_by: z.string().meta({ description: 'Name of the person' }),
  })
  .meta({ id: 'Condition', description: 'The sky as somebody, or a sensor, saw it' });
export type Condition = z.infer<typeof Condition>;

export const ConditionCorrection = z
  .strictObject({ utc: Utc.optional(), ...readings, comment: line(500).optional() })
  .refine((patch) => Object.keys(patch).length > 0, {
    message: 'Nothing to change: send at least one field.',
  })
  .meta({ id: 'ConditionCorrection', example: { cloud: 3 } });
export type ConditionCorrection = z.infer<typeof ConditionCorrection>;

export const ConditionParams = NightParams.extend({
  condition: PathId.meta({ description: 'Id of the entry' }),
});

const tag = 'conditions';
export const listConditions = operation({
  id: 'listConditions',
  method: 'get',
  path: '/nights/{id}/conditions',
  tag,
  summary: 'Conditions of a night, by time',
  params: NightParams,
  query: Page,
  answer: listOf(Condition),
});
export const addConditions = operation({
  id: 'addConditions',
  method: 'post',
  path: '/nights/{id}/conditions',
  tag,
  summary: 'Add one conditions entry, or up to 5,000 at once',
  description: 'All of them or none. One entry is answered by the entry, an array by a list.',
  params: NightParams,
  body: z.union([ConditionInput, ConditionsInput]),
  answer: z.union([Condition, listOf(Condition)]),
  status: 201,
  faults: ['conflict'],
});
export const correctCondition = operation({
  id: 'correctCondition',
  method: 'patch',
  path: '/nights/{id}/conditions/{condition}',
  tag,
  summary: 'Correct a conditions entry',
  description: 'The earlier values stay in the audit trail.',
  params: ConditionParams,
  body: ConditionCorrection,
  answer: Condition,
  faults: ['conflict'],
});
export const removeCondition = operation({
  id: 'removeCondition',
  method: 'delete',
  path: '/nights/{id}/conditions/{condition}',
  tag,
  summary: 'Withdraw a conditions entry',
  params: ConditionParams,
  query: z.object({ reason: Reason }),
  faults: ['conflict'],
});
