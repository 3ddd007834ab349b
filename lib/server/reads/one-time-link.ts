import 'server-only';
import { linkOf, type LinkPurpose, type LinkRow } from '@/lib/server/data/one-time-links';
import { secretHash } from '@/lib/server/identity/secrets';
import type { Visitor } from '@/lib/server/policy/caller';

export interface OneTimeLink {
  readonly state: LinkRow['state'];
  readonly purpose: LinkPurpose;
  readonly name: string;
  readonly email: string;
}

/** Whom a one-time link is for and whether it still works; null when there is no such link. Knowing it is the right to ask. */
export async function oneTimeLink(_visitor: Visitor | null, token: string): Promise<OneTimeLink | null> {
  const link = await linkOf(secretHash(token));
  return link && { state: link.state, purpose: link.purpose, name: link.name, email: link.email };
}
