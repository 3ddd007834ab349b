import 'server-only';
import {
  checkFrames,
  checkNight,
  checkStandards,
  mappingsOf,
  targetPlaces,
  type CheckFrame,
  type CheckNight,
  type CheckStandard,
  type MappingRow,
  type TargetPlace,
} from '@/lib/server/data/check-inputs';
import { instrumentOf, type InstrumentRow } from '@/lib/server/data/instruments';
import { requireSet, type MeasurementSetRow } from '@/lib/server/data/measurement-sets';
import type { JobCaller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';

export interface CheckInputs {
  readonly set: MeasurementSetRow;
  readonly night: CheckNight;
  readonly instrument: InstrumentRow;
  readonly frames: readonly CheckFrame[];
  readonly standards: readonly CheckStandard[];
  readonly mappings: readonly MappingRow[];
  readonly targets: readonly TargetPlace[];
}

/** Everything that a table is checked against, as it is at this moment. */
export async function checkInputs(caller: JobCaller, id: string): Promise<CheckInputs> {
  const set = await requireSet(dataScope(caller), id);
  const night = await checkNight(set.nightId);
  const [instrument, frames, standards, mappings, targets] = await Promise.all([
    instrumentOf(night),
    checkFrames(set.nightId),
    checkStandards(),
    mappingsOf(night.telescopeId),
    targetPlaces(set.uploadedById),
  ]);
  return { set, night, instrument, frames, standards, mappings, targets };
}
