import { z } from 'zod';
import { PublicId } from './common';
import { Light } from './light';
import { PasswordTried, PersonName } from './sign-in';

/** What a token may do; `write` alone would be of no use, so it brings reading. */
export const TokenAccess = z.enum(['read', 'read-write']);

/** For how long a token lives, in days; never, for what nobody looks after, has to be asked for. */
export const tokenLives = ['30', '90', '365', 'never'] as const;

export const ChangeName = z.object({ name: PersonName });
export const ChangePassword = z.object({
  current: PasswordTried,
  password: z.string().max(1000),
  repeated: z.string().max(1000),
});
export const ChooseLight = z.object({ light: Light });
export const MakeToken = z.object({
  name: z.string().trim().min(1, 'is missing').max(80, 'is longer than 80 characters'),
  access: TokenAccess,
  life: z.enum(tokenLives).transform((life) => (life === 'never' ? null : Number(life))),
});
export const TokenAlone = z.object({ token: PublicId });
/** A session as a list names it: the beginning of its hash, which opens nothing. */
export const SessionAlone = z.object({ session: z.string().regex(/^[0-9a-f]{16}$/, 'is not a session') });
