import { z } from 'zod';
import { CalendarDate, Declination, listOf, Page, RightAscension } from '@/lib/contracts/common';
import { operation } from './operation';

export const targetKinds = ['star', 'cluster', 'field'] as const;
export const TargetKind = z.enum(targetKinds);
export type TargetKind = z.infer<typeof TargetKind>;

export const Target = z
  .object({
    name: z.string(),
    kind: TargetKind,
    ra: RightAscension,
    dec: Declination,
    note: z.string(),
  })
  .meta({ id: 'Target', description: 'What a programme observes' });

export const Programme = z
  .object({
    code: z.string().meta({ example: 'MH26B-04' }),
    title: z.string(),
    targets: z.array(Target),
    proprietary_until: CalendarDate.optional().meta({
      description:
        'Day on which the latest night’s data become public, or did when the PI ended the period; absent before the first night',
    }),
  })
  .meta({ id: 'Programme', description: 'An awarded observing proposal' });
export type Programme = z.infer<typeof Programme>;

export const ProgrammeQuery = Page;

export const listProgrammes = operation({
  id: 'listProgrammes',
  method: 'get',
  path: '/programmes',
  tag: 'observatory',
  summary: 'Programmes that you may see, by code',
  description: 'Staff of the observatory see all; investigators their own.',
  query: ProgrammeQuery,
  answer: listOf(Programme),
});
