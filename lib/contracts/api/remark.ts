import { z } from 'zod';
import { listOf, Page, PathId, PublicId, Reason, Utc } from '@/lib/contracts/common';
import { NightParams } from './night';
import { operation } from './operation';

const text = z
  .string()
  .trim()
  .min(1, 'must not be empty')
  .max(10_000, 'must be at most 10,000 characters long')
  .meta({ example: 'Dome slit at 30° because of wind from the north.' });

export const RemarkInput = z
  .strictObject({
    utc: Utc.optional().meta({
      description: 'What time it is about, within the night’s noon to noon; now, if not given',
    }),
    text,
  })
  .meta({ id: 'RemarkInput' });
export type RemarkInput = z.infer<typeof RemarkInput>;

export const RemarkCorrection = z
  .strictObject({ utc: Utc.optional(), text: text.optional() })
  .refine((patch) => Object.keys(patch).length > 0, { message: 'Nothing to change: send utc or text.' })
  .meta({ id: 'RemarkCorrection', example: { text: 'Dome slit at 35° because of wind from the north.' } });
export type RemarkCorrection = z.infer<typeof RemarkCorrection>;

export const Remark = z
  .object({
    id: PublicId,
    utc: Utc,
    text: z.string(),
    written_by: z.string().meta({ description: 'Name of the person' }),
  })
  .meta({ id: 'Remark', description: 'Free text in the log' });
export type Remark = z.infer<typeof Remark>;

export const RemarkParams = NightParams.extend({ remark: PathId.meta({ description: 'Id of the remark' }) });

const tag = 'remarks';
export const listRemarks = operation({
  id: 'listRemarks',
  method: 'get',
  path: '/nights/{id}/remarks',
  tag,
  summary: 'Remarks of a night, by time',
  params: NightParams,
  query: Page,
  answer: listOf(Remark),
});
export const addRemark = operation({
  id: 'addRemark',
  method: 'post',
  path: '/nights/{id}/remarks',
  tag,
  summary: 'Write a remark',
  description: 'Possible in a closed night as well: what is learnt in the morning belongs to the night.',
  params: NightParams,
  body: RemarkInput,
  answer: Remark,
  status: 201,
});
export const correctRemark = operation({
  id: 'correctRemark',
  method: 'patch',
  path: '/nights/{id}/remarks/{remark}',
  tag,
  summary: 'Correct a remark',
  description: 'The earlier text stays in the audit trail.',
  params: RemarkParams,
  body: RemarkCorrection,
  answer: Remark,
});
export const removeRemark = operation({
  id: 'removeRemark',
  method: 'delete',
  path: '/nights/{id}/remarks/{remark}',
  tag,
  summary: 'Withdraw a remark',
  params: RemarkParams,
  query: z.object({ reason: Reason }),
});
