import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { insertTelescope, lockTelescope, sites, updateTelescope } from '@/lib/server/data/equipment';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface TelescopeValues {
  /** Its present code; empty for a new one. */
  readonly telescope: string;
  readonly code: string;
  readonly name: string;
  readonly site: string;
  readonly aperture: number;
  readonly minAltitude: number;
  readonly retiredOn: string | null;
}

/** Adds a telescope or changes one. Its code stays: clients and file names know it by that. */
export async function saveTelescope(
  caller: PersonCaller,
  { telescope, code, site, aperture, ...values }: TelescopeValues,
): Promise<{ readonly telescope: string }> {
  demand(caller, 'equipment.manage');
  return inTransaction(async (tx) => {
    const place = (await sites(tx)).find(({ name }) => name === site);
    if (!place) {
      throw new Fault('invalid-input', 'One thing is wrong with the form.', {
        issues: [{ path: 'site', value: site, message: 'is not a site of the observatory' }],
      });
    }
    const row = { ...values, aperture_m: aperture, siteId: place.id };
    const audit = { subjectKind: 'telescope', act: 'telescope.save' };
    if (telescope === '') {
      if ((await insertTelescope({ ...row, code }, tx)) === null) {
        throw new Fault('conflict', `There is a telescope ${code} already.`, {
          issues: [{ path: 'code', value: code, message: 'is taken' }],
        });
      }
      await recordAudit(tx, caller, { ...audit, subjectId: code, after: { ...values, aperture, site } });
      return { telescope: code };
    }
    const old = await lockTelescope(telescope, tx);
    if (!old) throw new Fault('not-found', 'There is no such telescope.');
    const { id, code: _code, ...before } = old;
    const change = differences(before, row);
    if (Object.keys(change.after).length === 0) return { telescope };
    await updateTelescope(id, row, tx);
    await recordAudit(tx, caller, { ...audit, subjectId: telescope, ...change });
    return { telescope };
  });
}
