import 'server-only';
import { createHash } from 'node:crypto';
import type { SavedMapping, SaveMapping } from '@/lib/contracts/api/measurement-set';
import { columnPositions, headerKey, headersKey } from '@/lib/contracts/measurement-columns';
import { Fault, type Issue } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { saveMapping } from '@/lib/server/data/column-mappings';
import { inTransaction } from '@/lib/server/data/database';
import { programmesInNight } from '@/lib/server/data/measurement-sets';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Remembers how tables with these headers are read, for the night's telescope. */
export async function saveColumnMapping(
  caller: PersonCaller,
  nightId: string,
  input: SaveMapping,
): Promise<SavedMapping> {
  const night = await requireNight(nightScope(caller), nightId);
  demand(caller, 'mapping.save', { ...subjectOf(night), programmeIds: await programmesInNight(night.id) });
  refuseUnusable(input);
  const savedAt = new Date();
  const saved = { headers: input.headers.map((header) => header.trim()), mapping: input.mapping };
  await inTransaction(async (tx) => {
    await saveMapping(tx, {
      telescopeId: night.telescopeId,
      headerKey: createHash('sha256').update(headersKey(saved.headers)).digest('hex'),
      ...saved,
      savedById: caller.personId,
      savedAt,
    });
    await recordAudit(tx, caller, {
      act: 'mapping.save',
      subjectKind: 'telescope',
      subjectId: night.telescope,
      nightId: night.id,
      after: saved,
    });
  });
  return { ...saved, saved_by: caller.name, saved_at: savedAt.toISOString() };
}

/** A mapping names headers that are there, each for one column. */
function refuseUnusable({ headers, mapping }: SaveMapping): void {
  const present = columnPositions(headers, mapping);
  const used = new Set<string>();
  const issues: Issue[] = [];
  for (const [column, header] of Object.entries(mapping)) {
    const path = `mapping.${column}`;
    if (![...present.keys()].some((one) => one === column)) {
      issues.push({ path, value: header, message: 'is not among the headers' });
    } else if (used.has(headerKey(header))) {
      issues.push({ path, value: header, message: 'stands for another column already' });
    }
    used.add(headerKey(header));
  }
  if (issues.length > 0)
    throw new Fault('invalid-input', 'The mapping does not fit the headers.', { issues });
}
