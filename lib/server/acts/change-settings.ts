import 'server-only';
import { readSettings, type Settings } from '@/lib/contracts/settings';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { lockObservatory, updateObservatory } from '@/lib/server/data/observatory';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface Changed {
  readonly name: string;
  readonly publicReleases: boolean;
  readonly secondApprover: boolean;
  readonly proprietaryMonths: number;
  readonly scatterV: number;
  readonly scatterB: number;
  readonly notPhotometric: number;
  readonly driftSigma: number;
}

/** Changes the observatory's name and rules. */
export async function changeSettings(
  caller: PersonCaller,
  changed: Changed,
): Promise<{ readonly name: string }> {
  demand(caller, 'settings.manage');
  const { name, publicReleases, secondApprover, proprietaryMonths, ...verdict } = changed;
  const settings: Settings = { publicReleases, secondApprover, proprietaryMonths, verdict };
  return inTransaction(async (tx) => {
    const present = await lockObservatory(tx);
    if (!present) throw new Fault('not-found', 'There is no observatory yet: make the first manager first.');
    const flat = ({ verdict: limits, ...rest }: Settings) => ({ ...rest, ...limits });
    const change = differences(
      { name: present.name, ...flat(readSettings(present.settings)) },
      { name, ...flat(settings) },
    );
    if (Object.keys(change.after).length === 0) return { name };
    await updateObservatory(present.id, name, settings, tx);
    await recordAudit(tx, caller, {
      act: 'settings.change',
      subjectKind: 'observatory',
      subjectId: String(present.id),
      ...change,
    });
    return { name };
  });
}
