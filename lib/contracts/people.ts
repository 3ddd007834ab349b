import { z } from 'zod';
import { PublicId } from './common';
import { ObservatoryRole, type ProgrammeRole } from './roles';
import { Email, PersonName } from './sign-in';

/** A form's tick boxes: none, one or several values under one name. */
const ticked = <T extends z.ZodType>(item: T) =>
  z
    .union([z.array(item), item.transform((one) => [one])])
    .optional()
    .transform((values) => [...new Set((values ?? []) as z.output<T>[])]);

export const Roles = ticked(ObservatoryRole);

export const InvitePerson = z.object({ email: Email, name: PersonName, roles: Roles });
export const PersonAlone = z.object({ person: PublicId });
export const ChangePerson = z.object({ person: PublicId, name: PersonName, roles: Roles });
export const FirstManager = z.object({ email: Email, name: PersonName });

/** Hours for which a one-time link works. */
export const linkLife_hours = 72;

/** A person as the people page lists them. */
export interface PersonListed {
  readonly publicId: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly ObservatoryRole[];
  readonly programmes: readonly { readonly code: string; readonly role: ProgrammeRole }[];
  /** Invited: no password yet. */
  readonly state: 'active' | 'invited' | 'disabled';
  readonly lastSignIn: string | null;
}
