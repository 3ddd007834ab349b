import { z } from 'zod';
import { line, listOf, PathId, PublicId, Reason } from '@/lib/contracts/common';
import { NightParams } from './night';
import { operation } from './operation';

export const lossCauses = ['weather', 'technical', 'other'] as const;
export const LossCause = z.enum(lossCauses);
export type LossCause = z.infer<typeof LossCause>;

const minutes = z
  .number()
  .int('must be whole minutes')
  .min(1, 'must be at least 1 minute')
  .max(1440, 'must be at most 1,440 minutes')
  .meta({ example: 45 });

export const TimeLossInput = z
  .strictObject({ cause: LossCause, minutes, comment: line(500).default('') })
  .meta({ id: 'TimeLossInput' });
export type TimeLossInput = z.infer<typeof TimeLossInput>;

export const TimeLossCorrection = z
  .strictObject({ cause: LossCause.optional(), minutes: minutes.optional(), comment: line(500).optional() })
  .refine((patch) => Object.keys(patch).length > 0, {
    message: 'Nothing to change: send at least one field.',
  })
  .meta({ id: 'TimeLossCorrection', example: { minutes: 30 } });
export type TimeLossCorrection = z.infer<typeof TimeLossCorrection>;

export const TimeLoss = z
  .object({
    id: PublicId,
    cause: LossCause,
    minutes: z.number().int(),
    comment: z.string(),
    recorded_by: z.string().meta({ description: 'Name of the person' }),
  })
  .meta({ id: 'TimeLoss', description: 'Observing time lost, and to what' });
export type TimeLoss = z.infer<typeof TimeLoss>;

export const TimeLossParams = NightParams.extend({ loss: PathId.meta({ description: 'Id of the entry' }) });

const tag = 'time lost';
export const listTimeLosses = operation({
  id: 'listTimeLosses',
  method: 'get',
  path: '/nights/{id}/time-losses',
  tag,
  summary: 'Time lost in a night',
  params: NightParams,
  answer: listOf(TimeLoss),
});
export const addTimeLoss = operation({
  id: 'addTimeLoss',
  method: 'post',
  path: '/nights/{id}/time-losses',
  tag,
  summary: 'Record time lost',
  description: 'All losses together cannot be longer than the night. Possible in a closed night as well.',
  params: NightParams,
  body: TimeLossInput,
  answer: TimeLoss,
  status: 201,
});
export const correctTimeLoss = operation({
  id: 'correctTimeLoss',
  method: 'patch',
  path: '/nights/{id}/time-losses/{loss}',
  tag,
  summary: 'Correct an entry of time lost',
  params: TimeLossParams,
  body: TimeLossCorrection,
  answer: TimeLoss,
});
export const removeTimeLoss = operation({
  id: 'removeTimeLoss',
  method: 'delete',
  path: '/nights/{id}/time-losses/{loss}',
  tag,
  summary: 'Withdraw an entry of time lost',
  params: TimeLossParams,
  query: z.object({ reason: Reason }),
});
