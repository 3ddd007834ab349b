import 'server-only';
import type { Programme } from '@/lib/contracts/api/programme';
import type { Page } from '@/lib/contracts/common';
import { fromCursor, pageOf } from '@/lib/server/data/cursor';
import { programmes, targetsOf } from '@/lib/server/data/programmes';
import type { Caller } from '@/lib/server/policy/caller';
import { programmeScope } from '@/lib/server/policy/scope';

/** A page of the programmes that the caller may see, in the form of the HTTP interface. */
export async function readProgrammes(
  caller: Caller,
  { after, limit }: Page,
): Promise<{ items: Programme[]; next: string | null }> {
  const last = fromCursor(after, ['string']);
  const found = await programmes(programmeScope(caller), {
    after: last === null ? undefined : String(last[0]),
    limit: limit + 1,
  });
  const { rows, next } = pageOf(found, limit, ({ code }) => [code]);
  const targets = await targetsOf(rows.map(({ id }) => id));
  return {
    items: rows.map((row) => ({
      code: row.code,
      title: row.title,
      targets: targets
        .filter(({ programmeId }) => programmeId === row.id)
        .map(({ name, kind, ra, dec, note }) => ({ name, kind, ra, dec, note })),
      ...(row.proprietaryUntil === null ? {} : { proprietary_until: row.proprietaryUntil }),
    })),
    next,
  };
}
