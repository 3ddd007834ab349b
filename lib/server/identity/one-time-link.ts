import 'server-only';
import { linkLife_hours } from '@/lib/contracts/people';
import type { Tx } from '@/lib/server/data/database';
import { insertLink, type LinkPurpose } from '@/lib/server/data/one-time-links';
import { environment } from '@/lib/server/settings/environment';
import { newSecret, secretHash } from './secrets';

export interface MadeLink {
  /** The whole address, to be shown or mailed once. */
  readonly link: string;
  readonly hash: string;
}

/** Makes a one-time link for a person; earlier ones end with it. */
export async function makeOneTimeLink(
  tx: Tx,
  person: { readonly id: number; readonly purpose: LinkPurpose; readonly createdById: number | null },
): Promise<MadeLink> {
  const token = newSecret();
  const hash = secretHash(token);
  const { id, purpose, createdById } = person;
  await insertLink({ personId: id, purpose, hash, life_hours: linkLife_hours, createdById }, tx);
  return { link: `${environment().baseUrl}/welcome/${token}`, hash };
}
