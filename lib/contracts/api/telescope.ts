import { z } from 'zod';
import { Band } from '@/lib/contracts/bands';
import { listOf, Page } from '@/lib/contracts/common';
import { operation } from './operation';

export const TelescopeSite = z
  .object({
    name: z.string(),
    longitude: z.number().meta({ description: 'deg, east positive' }),
    latitude: z.number().meta({ description: 'deg, north positive' }),
    elevation: z.number().meta({ description: 'm' }),
    timezone: z.string().meta({ description: 'IANA name', example: 'Atlantic/Canary' }),
  })
  .meta({ id: 'Site', description: 'A place on Earth' });

export const Telescope = z
  .object({
    code: z.string().meta({ example: 'larkspur' }),
    name: z.string(),
    site: TelescopeSite,
    bands: z.array(Band).meta({ description: 'Bands of its filters, blue to red' }),
  })
  .meta({ id: 'Telescope' });
export type Telescope = z.infer<typeof Telescope>;

export const TelescopeQuery = Page;

export const listTelescopes = operation({
  id: 'listTelescopes',
  method: 'get',
  path: '/telescopes',
  tag: 'observatory',
  summary: 'Telescopes in use, by code, with their sites and bands',
  query: TelescopeQuery,
  answer: listOf(Telescope),
});
