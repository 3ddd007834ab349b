import 'server-only';
import type { ChangeNight, Night } from '@/lib/contracts/api/night';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { demandNightVersion, lockNight } from '@/lib/server/data/night-state';
import { observersByPublicId, setObservers, touchNight } from '@/lib/server/data/night-writes';
import { requireNight, subjectOf, toNight } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

/** Changes the summary or the observers of a night, whatever its state: neither is an input of a calibration. */
export async function changeNight(caller: PersonCaller, id: string, input: ChangeNight): Promise<Night> {
  const scope = nightScope(caller);
  const seen = await requireNight(scope, id);
  demand(caller, 'night.log', subjectOf(seen));
  return inTransaction(async (tx) => {
    const locked = await lockNight(tx, seen);
    await demandNightVersion(tx, seen, locked, input.version);
    const before = toNight(await requireNight(scope, id, tx));
    if (input.observers !== undefined) {
      const people = await observersByPublicId(tx, input.observers);
      await setObservers(
        tx,
        seen.id,
        people.map(({ personId }) => personId),
      );
    }
    await touchNight(tx, seen.id, input.summary);
    const after = toNight(await requireNight(scope, id, tx));
    const changed = (night: Night): object => ({
      ...(input.summary === undefined ? {} : { summary: night.summary }),
      ...(input.observers === undefined ? {} : { observers: night.observers }),
    });
    await recordAudit(tx, caller, {
      act: 'night.change',
      subjectKind: 'night',
      subjectId: seen.publicId,
      nightId: seen.id,
      before: changed(before),
      after: changed(after),
    });
    return after;
  });
}
