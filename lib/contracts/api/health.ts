import { z } from 'zod';
import { operation } from './operation';

export const Health = z
  .object({
    status: z.enum(['ok', 'degraded']),
    database: z.enum(['ok', 'unreachable']),
    version: z.string(),
  })
  .meta({ id: 'Health', description: 'Whether this process can serve' });

export const getHealth = operation({
  id: 'getHealth',
  method: 'get',
  path: '/health',
  tag: 'service',
  summary: 'Whether the service can answer',
  answer: Health,
  open: true,
  // Whether the database is there must be told to those, too, whose credentials it holds.
  anonymous: true,
});
