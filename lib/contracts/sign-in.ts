import { z } from 'zod';
import { passwordMax } from './password';

/** An address as people type it: blanks around it and capitals do not matter. */
export const Email = z
  .string()
  .trim()
  .toLowerCase()
  .pipe(z.email('is not an e-mail address').max(254, 'is longer than 254 characters'));

export const PersonName = z
  .string()
  .trim()
  .min(1, 'is missing')
  .max(120, 'is longer than 120 characters')
  .regex(/^[^\p{Cc}]*$/u, 'has control characters');

/** A password as it is tried: its rules are for new ones only. */
export const PasswordTried = z
  .string()
  .min(1, 'is missing')
  .max(passwordMax, `is longer than ${passwordMax} characters`);

export const SignIn = z.object({
  email: Email,
  password: PasswordTried,
  next: z.string().max(1000).optional(),
});

export const AcceptLink = z.object({
  token: z.string().min(1).max(100),
  password: z.string().max(1000),
  repeated: z.string().max(1000),
});
