import 'server-only';
import type { MeanExtinction } from '@/lib/contracts/equipment';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { insertSite, sites, updateSite } from '@/lib/server/data/equipment';
import { lockObservatory } from '@/lib/server/data/observatory';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface SiteValues {
  /** Its present name; empty for a new one. */
  readonly site: string;
  readonly name: string;
  readonly longitude: number;
  readonly latitude: number;
  readonly elevation: number;
  readonly timezone: string;
  readonly meanExtinction: MeanExtinction;
}

/** Adds a site or changes one. Frames logged before keep the geometry that was computed for them. */
export async function saveSite(
  caller: PersonCaller,
  { site, ...values }: SiteValues,
): Promise<{ readonly name: string }> {
  demand(caller, 'site.manage');
  return inTransaction(async (tx) => {
    // The observatory's row serialises changes of its sites.
    const observatory = await lockObservatory(tx);
    if (!observatory) throw new Fault('not-found', 'There is no observatory yet.');
    const present = await sites(tx);
    const old = present.find(({ name }) => name === site);
    if (site !== '' && !old) throw new Fault('not-found', `There is no site ${site} any more.`);
    if (present.some(({ id, name }) => name === values.name && id !== old?.id)) {
      throw new Fault('conflict', `There is a site ${values.name} already.`, {
        issues: [{ path: 'name', value: values.name, message: 'is taken' }],
      });
    }
    const change = old ? differences(withoutId(old), values) : { before: null, after: values };
    if (Object.keys(change.after).length === 0) return { name: values.name };
    if (old) await updateSite(old.id, values, tx);
    else await insertSite(observatory.id, values, tx);
    await recordAudit(tx, caller, {
      act: 'site.save',
      subjectKind: 'site',
      subjectId: values.name,
      ...change,
    });
    return { name: values.name };
  });
}

const withoutId = <T extends { id: number }>({ id: _id, ...rest }: T): Omit<T, 'id'> => rest;
