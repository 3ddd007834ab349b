import { z } from 'zod';
import { line } from '@/lib/contracts/common';
import { Email, PasswordTried } from '@/lib/contracts/sign-in';
import { operation } from './operation';

export const tokenScopes = ['read', 'write'] as const;
const TokenScope = z.enum(tokenScopes);

export const NewToken = z
  .object({
    email: Email.meta({ description: 'Your address at this service', example: 'observer@evenfall.example' }),
    password: PasswordTried.meta({ format: 'password' }),
    name: line(80)
      .min(1, 'is missing')
      .meta({ description: 'What the token is for', example: 'dome computer' }),
    scopes: z
      .array(TokenScope)
      .min(1, 'must name at least one scope')
      .default(['read', 'write'])
      .transform((scopes) => tokenScopes.filter((scope) => scope === 'read' || scopes.includes(scope)))
      .meta({ description: '`read` alone can change nothing; `write` brings `read`' }),
  })
  .meta({ id: 'NewToken' });

export const MadeToken = z
  .object({
    token: z.string().meta({
      description: 'The token, shown here and never again; send it as `Authorization: Bearer …`',
      example: 'evf_5rL9…',
    }),
  })
  .meta({ id: 'MadeToken' });

export const createToken = operation({
  id: 'createToken',
  method: 'post',
  path: '/tokens',
  tag: 'access',
  summary: 'Make an API token by e-mail address and password',
  description:
    'The token is valid for a year; it is revoked on the account page. Failed tries slow further ones down: the answer 429 says for how long.',
  body: NewToken,
  answer: MadeToken,
  status: 201,
  open: true,
  secret: true,
  faults: ['not-signed-in', 'too-many'],
});
