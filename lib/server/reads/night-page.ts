import 'server-only';
import type { NightLog } from '@/lib/contracts/night-log';
import { allConditionRows, toCondition } from '@/lib/server/data/conditions';
import { allFrameRows, toFrame } from '@/lib/server/data/frames';
import { instrumentOf } from '@/lib/server/data/instruments';
import { countSets } from '@/lib/server/data/measurement-sets';
import { requireNight, subjectOf, toNight } from '@/lib/server/data/nights';
import { allRemarkRows, toRemark } from '@/lib/server/data/remarks';
import { allTimeLossRows, toTimeLoss } from '@/lib/server/data/time-losses';
import type { Caller } from '@/lib/server/policy/caller';
import { may } from '@/lib/server/policy/matrix';
import { dataScope, nightScope } from '@/lib/server/policy/scope';

/** All that the page of a night shows: nine statements, however much was logged. */
export async function nightPage(caller: Caller, id: string): Promise<NightLog> {
  const scope = nightScope(caller);
  const row = await requireNight(scope, id);
  const [instrument, frames, conditions, remarks, losses, sets] = await Promise.all([
    instrumentOf(row),
    allFrameRows(scope, row.id),
    allConditionRows(row.id),
    allRemarkRows(row.id),
    allTimeLossRows(row.id),
    countSets(dataScope(caller), row.id),
  ]);
  const programmeIds = frames.flatMap(({ programmeId }) => programmeId ?? []);
  const subject = { ...subjectOf(row), programmeIds: [...new Set(programmeIds)] };
  return {
    night: toNight(row),
    telescope: {
      code: instrument.code,
      name: instrument.name,
      filters: instrument.filters,
    },
    site: {
      name: instrument.siteName,
      longitude: instrument.longitude,
      latitude: instrument.latitude,
      elevation: instrument.elevation,
      timezone: instrument.timezone,
    },
    frames: frames.map(toFrame),
    conditions: conditions.map(toCondition),
    remarks: remarks.map(toRemark),
    timeLosses: losses.map(toTimeLoss),
    sets,
    may: {
      log: row.state === 'open' && may(caller, 'night.log', subject),
      close: row.state === 'open' && may(caller, 'night.close', subject),
      reopen: row.state !== 'open' && may(caller, 'night.reopen', subject),
      upload: may(caller, 'measurements.upload', subject),
    },
  };
}
