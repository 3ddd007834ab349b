import 'server-only';
import type { Band } from '@/lib/contracts/bands';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import {
  bandsWithFrames,
  deleteFilter,
  filtersOf,
  lockTelescope,
  upsertFilter,
} from '@/lib/server/data/equipment';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface Filter {
  readonly band: Band;
  readonly name: string;
  readonly defaultExposure: number | null;
}

/** Says which bands a telescope observes in. A band with frames stays: its nights would not be readable without it. */
export async function setFilters(
  caller: PersonCaller,
  { telescope: code, filters }: { readonly telescope: string; readonly filters: readonly Filter[] },
): Promise<{ readonly telescope: string }> {
  demand(caller, 'equipment.manage');
  return inTransaction(async (tx) => {
    const telescope = await lockTelescope(code, tx);
    if (!telescope) throw new Fault('not-found', 'There is no such telescope.');
    const before = (await filtersOf([telescope.id], tx)).map(({ band, name, defaultExposure }): Filter => ({
      band,
      name,
      defaultExposure,
    }));
    if (JSON.stringify(before) === JSON.stringify(filters)) return { telescope: code };
    const kept = new Set(filters.map(({ band }) => band));
    const dropped = before.map(({ band }) => band).filter((band) => !kept.has(band));
    const used = dropped.length === 0 ? [] : await bandsWithFrames(telescope.id, tx);
    const [stuck] = dropped.filter((band) => used.includes(band));
    if (stuck !== undefined) {
      throw new Fault('conflict', `The band ${stuck} has frames in the log and cannot be taken away.`, {
        issues: [{ path: `has${stuck}`, value: stuck, message: 'has frames in the log' }],
      });
    }
    for (const band of dropped) await deleteFilter(telescope.id, band, tx);
    for (const filter of filters) await upsertFilter({ ...filter, telescopeId: telescope.id }, tx);
    await recordAudit(tx, caller, {
      act: 'filters.set',
      subjectKind: 'telescope',
      subjectId: code,
      before: { filters: before },
      after: { filters },
    });
    return { telescope: code };
  });
}
