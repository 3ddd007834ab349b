import 'server-only';
import type { TargetKind } from '@/lib/contracts/api/programme';
import { starKey } from '@/lib/contracts/star-name';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { managedProgramme } from '@/lib/server/data/managed-programme';
import { insertTarget, targetByKey, updateTarget, type TargetRow } from '@/lib/server/data/programmes';
import type { PersonCaller } from '@/lib/server/policy/caller';

interface Target {
  readonly programme: string;
  /** Its present name; empty for a new one. */
  readonly target: string;
  readonly name: string;
  readonly kind: TargetKind;
  /** deg J2000 */
  readonly ra: number;
  /** deg J2000 */
  readonly dec: number;
  readonly note: string;
}

/** Adds a target or changes one. Frames logged before keep the coordinates they were logged with. */
export async function saveTarget(
  caller: PersonCaller,
  { programme: code, target, ...values }: Target,
): Promise<{ readonly name: string }> {
  return inTransaction(async (tx) => {
    const { id: programmeId } = await managedProgramme(caller, code, tx);
    const present = target === '' ? null : await existing(programmeId, target, tx);
    const row = { ...values, programmeId, nameKey: starKey(values.name) };
    const twin = await targetByKey(programmeId, row.nameKey, tx);
    if (twin && twin.id !== present?.id) {
      throw new Fault('conflict', `The programme has a target ${twin.name} already.`, {
        issues: [
          { path: 'name', value: values.name, message: `is the name of a target already: ${twin.name}` },
        ],
      });
    }
    if (present) await updateTarget(present.id, row, tx);
    else await insertTarget(row, tx);
    await recordAudit(tx, caller, {
      act: 'programme.target',
      subjectKind: 'programme',
      subjectId: code,
      programmeId,
      before: present && valuesOf(present),
      after: values,
    });
    return { name: values.name };
  });
}

const valuesOf = ({ name, kind, ra, dec, note }: TargetRow) => ({ name, kind, ra, dec, note });

async function existing(programmeId: number, name: string, tx: Tx): Promise<TargetRow> {
  const found = await targetByKey(programmeId, starKey(name), tx);
  if (!found) throw new Fault('not-found', `The programme has no target ${name} any more.`);
  return found;
}
