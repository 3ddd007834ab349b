import { z } from 'zod';
import { PublicId } from '@/lib/contracts/common';
import { ObservatoryRole, ProgrammeRole } from '@/lib/contracts/roles';
import { operation } from './operation';
import { tokenScopes } from './token';

export const Me = z
  .object({
    id: PublicId,
    name: z.string(),
    email: z.string(),
    roles: z.array(ObservatoryRole).meta({ description: 'Roles that hold for the whole observatory' }),
    programmes: z
      .array(z.object({ code: z.string(), title: z.string(), role: ProgrammeRole }))
      .meta({ description: 'Programmes that you belong to' }),
    via: z.enum(['session', 'token']),
    scopes: z.array(z.enum(tokenScopes)).meta({ description: 'What this token may do' }),
  })
  .meta({ id: 'Me', description: 'Who a session or token is' });
export type Me = z.infer<typeof Me>;

export const getMe = operation({
  id: 'getMe',
  method: 'get',
  path: '/me',
  tag: 'access',
  summary: 'Who you are: name, roles, programmes',
  answer: Me,
});
