import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { camerasOf, insertCamera, lockTelescope, updateCamera } from '@/lib/server/data/equipment';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface CameraValues {
  readonly telescope: string;
  /** Its present name; empty for a new one. */
  readonly camera: string;
  readonly name: string;
  readonly width: number;
  readonly height: number;
  readonly pixelScale: number;
  readonly gain: number;
  readonly readNoise: number;
  readonly saturation: number;
}

/** Adds a camera to a telescope or changes one. */
export async function saveCamera(
  caller: PersonCaller,
  { telescope: code, camera, width, height, ...values }: CameraValues,
): Promise<{ readonly telescope: string }> {
  demand(caller, 'equipment.manage');
  return inTransaction(async (tx) => {
    const telescope = await lockTelescope(code, tx);
    if (!telescope) throw new Fault('not-found', 'There is no such telescope.');
    const present = await camerasOf(telescope.id, tx);
    const old = present.find(({ name }) => name === camera);
    if (camera !== '' && !old) throw new Fault('not-found', `There is no camera ${camera} any more.`);
    if (present.some(({ id, name }) => name === values.name && id !== old?.id)) {
      throw new Fault('conflict', `The telescope has a camera ${values.name} already.`, {
        issues: [{ path: 'name', value: values.name, message: 'is taken' }],
      });
    }
    const row = { ...values, telescopeId: telescope.id, width_px: width, height_px: height };
    const change = old ? differences(old, { ...row, id: old.id }) : { before: null, after: row };
    if (Object.keys(change.after).length === 0) return { telescope: code };
    if (old) await updateCamera(old.id, row, tx);
    else await insertCamera(row, tx);
    await recordAudit(tx, caller, {
      act: 'camera.save',
      subjectKind: 'telescope',
      subjectId: code,
      ...change,
    });
    return { telescope: code };
  });
}
