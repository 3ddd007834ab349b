import 'server-only';
import type { MeasurementSet, SavedMapping } from '@/lib/contracts/api/measurement-set';
import { mappingsOf } from '@/lib/server/data/check-inputs';
import { programmesInNight } from '@/lib/server/data/measurement-sets';
import { findNight, requireNight, subjectOf } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';
import { dataScope, nightScope } from '@/lib/server/policy/scope';
import { environment } from '@/lib/server/settings/environment';
import { toMapping } from './column-mappings';
import { nightMeasurements } from './measurement-sets';

export interface MeasurementsPage {
  /** Null where the night's measurements are not the caller's to see, though its log is. */
  readonly sets: readonly MeasurementSet[] | null;
  readonly mayUpload: boolean;
  /** How tables of the telescope are read that do not use our names. */
  readonly mappings: readonly SavedMapping[];
  readonly limit_bytes: number;
}

/** Most sets that the page lists; a night has a handful. */
const mostSets = 200;

/** What a night's page of measurements shows. */
export async function measurementsPage(caller: Caller, id: string): Promise<MeasurementsPage> {
  const night = await requireNight(nightScope(caller), id);
  const [visible, programmeIds, mappings] = await Promise.all([
    findNight(dataScope(caller), id),
    programmesInNight(night.id),
    mappingsOf(night.telescopeId),
  ]);
  return {
    sets: visible && (await nightMeasurements(caller, id, { limit: mostSets })).items,
    mayUpload: may(caller, 'measurements.upload', { ...subjectOf(night), programmeIds }),
    mappings: mappings.map(toMapping),
    limit_bytes: environment().uploadLimit_bytes,
  };
}
