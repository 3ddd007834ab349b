import 'server-only';
import type { ColourTerms } from '@/lib/contracts/equipment';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import {
  camerasOf,
  epochsOf,
  insertEpoch,
  lockTelescope,
  updateEpoch,
  type EpochRow,
} from '@/lib/server/data/equipment';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface EpochValues {
  readonly telescope: string;
  /** Its present first day; empty for a new one. */
  readonly epoch: string;
  readonly camera: string;
  readonly startsOn: string;
  /** First date that no longer belongs to it; null while it lasts. */
  readonly endsOn: string | null;
  readonly description: string;
  readonly colourTerms: ColourTerms;
}

/** Adds an equipment epoch or changes one. Epochs of a telescope do not overlap: a night has one set of colour terms. */
export async function saveEpoch(
  caller: PersonCaller,
  { telescope: code, epoch, camera: cameraName, ...values }: EpochValues,
): Promise<{ readonly telescope: string }> {
  demand(caller, 'equipment.manage');
  return inTransaction(async (tx) => {
    const telescope = await lockTelescope(code, tx);
    if (!telescope) throw new Fault('not-found', 'There is no such telescope.');
    const camera = (await camerasOf(telescope.id, tx)).find(({ name }) => name === cameraName);
    if (!camera) {
      throw new Fault('invalid-input', 'One thing is wrong with the form.', {
        issues: [{ path: 'camera', value: cameraName, message: 'is not a camera of this telescope' }],
      });
    }
    const present = await epochsOf(telescope.id, tx);
    const old = present.find(({ startsOn }) => startsOn === epoch);
    if (epoch !== '' && !old) throw new Fault('not-found', 'There is no such epoch any more.');
    demandApart(
      values,
      present.filter(({ id }) => id !== old?.id),
    );
    const row = { ...values, telescopeId: telescope.id, cameraId: camera.id };
    const change = old ? differences(old, { ...row, id: old.id }) : { before: null, after: row };
    if (Object.keys(change.after).length === 0) return { telescope: code };
    if (old) await updateEpoch(old.id, row, tx);
    else await insertEpoch(row, tx);
    await recordAudit(tx, caller, {
      act: 'epoch.save',
      subjectKind: 'telescope',
      subjectId: code,
      ...change,
    });
    return { telescope: code };
  });
}

/** Later than any date, for an epoch without an end. */
const open = '9999-12-31';

function demandApart(
  { startsOn, endsOn }: Pick<EpochValues, 'startsOn' | 'endsOn'>,
  others: readonly EpochRow[],
): void {
  const clash = others.find(
    (other) => startsOn < (other.endsOn ?? open) && other.startsOn < (endsOn ?? open),
  );
  if (!clash) return;
  const until = clash.endsOn === null ? 'has no end yet' : `lasts until ${clash.endsOn}`;
  throw new Fault(
    'conflict',
    `It overlaps the epoch from ${clash.startsOn}, which ${until}. End that one first.`,
    {
      issues: [{ path: 'startsOn', value: startsOn, message: `overlaps the epoch from ${clash.startsOn}` }],
    },
  );
}
