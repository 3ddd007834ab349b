import { z } from 'zod';
import { Declination, RightAscension } from '@/lib/contracts/common';
import { operation } from './operation';

export const ObjectName = z
  .object({
    name: z.string(),
    kind: z.enum(['target', 'standard field']),
    programme: z.string().nullable().meta({ description: 'Code of the programme whose target it is' }),
    ra: RightAscension,
    dec: Declination,
  })
  .meta({ id: 'ObjectName', description: 'An object whose coordinates the log knows' });
export type ObjectName = z.infer<typeof ObjectName>;

export const ObjectQuery = z.object({
  q: z
    .string()
    .trim()
    .max(80)
    .default('')
    .meta({ description: 'Part of the name, ignoring case, blanks and hyphens' }),
  limit: z.coerce.number().int().min(1).max(1000).default(1000),
});
export type ObjectQuery = z.infer<typeof ObjectQuery>;

export const listObjects = operation({
  id: 'listObjects',
  method: 'get',
  path: '/objects',
  tag: 'frames',
  summary: 'Names that a frame’s object can have, with coordinates',
  description: 'Targets of the programmes that you may see, and the standard fields with their centres.',
  query: ObjectQuery,
  answer: z.object({ items: z.array(ObjectName), next: z.null() }),
});
