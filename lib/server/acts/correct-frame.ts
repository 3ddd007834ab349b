import 'server-only';
import { frameGeometry } from '@/lib/astro/frame-geometry';
import { frameFaults, frameFaultsInNight, type Frame, type FrameCorrection } from '@/lib/contracts/api/frame';
import { Fault, type Issue } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { completeFrames, type Completed } from '@/lib/server/data/complete-frames';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { differences } from '@/lib/server/data/differences';
import { rescaleFluxMagnitudes } from '@/lib/server/data/flux-magnitudes';
import { framesInTheWay, toFrameValues, updateFrame } from '@/lib/server/data/frame-writes';
import { findFrame, toFrame, type FrameRow } from '@/lib/server/data/frames';
import { instrumentOf, type InstrumentRow } from '@/lib/server/data/instruments';
import { lastChangeWords } from '@/lib/server/data/last-change';
import { lockOpenNight } from '@/lib/server/data/night-state';
import { boundsOf, requireNight, subjectOf, type NightRow } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { dataScope, nightScope } from '@/lib/server/policy/scope';

/**
 * Corrects a frame of an open night; the earlier values stay in the audit trail, the geometry is derived anew,
 * and magnitudes that were made from counts follow a corrected exposure.
 */
export async function correctFrame(
  caller: PersonCaller,
  ids: { readonly night: string; readonly frame: string },
  patch: FrameCorrection,
): Promise<Frame> {
  const scope = nightScope(caller);
  const night = await requireNight(scope, ids.night);
  demand(caller, 'night.log', subjectOf(night));
  const present = async (tx: Tx | null): Promise<FrameRow> => {
    const row = await findFrame(scope, night.id, ids.frame, tx);
    if (!row) throw new Fault('not-found', 'There is no such frame in this night.');
    if (row.version !== patch.version) throw await stale(tx, row, patch);
    return row;
  };
  const seen = await present(null);
  const instrument = await instrumentOf(night);
  const merged = merge(toFrame(seen), patch);
  const { place, issues } = await placeOf(seen, merged, patch);
  refuse([...ownIssues(merged, night, instrument), ...issues]);
  const geometry = frameGeometry({
    site: instrument,
    ra: place.ra,
    dec: place.decl,
    utcStart: Date.parse(merged.utc_start),
    exposure_s: merged.exposure,
  });
  return inTransaction(async (tx) => {
    await lockOpenNight(tx, night);
    await present(tx);
    refuse(await clashes(tx, night.id, seen.id, merged));
    await rescaleFluxMagnitudes(tx, dataScope(caller), seen, merged.exposure);
    const values = toFrameValues(merged, place, geometry, merged.number);
    // Cannot fail under the night's lock; if it does, nothing may go on.
    if (!(await updateFrame(tx, seen, values))) throw await stale(tx, seen, patch);
    const after = await findFrame(scope, night.id, ids.frame, tx);
    if (!after) throw new Error('A corrected frame is gone within its transaction.');
    await recordAudit(tx, caller, {
      act: 'frame.correct',
      subjectKind: 'frame',
      subjectId: seen.publicId,
      nightId: night.id,
      programmeId: after.programmeId ?? seen.programmeId,
      reason: patch.reason ?? '',
      ...differences(toFrame(seen), toFrame(after), ['version', 'cautions']),
    });
    return toFrame(after);
  });
}

type Merged = ReturnType<typeof merge>;
function merge(frame: Frame, { version: _version, reason: _reason, ...patch }: FrameCorrection) {
  const told = Object.fromEntries(Object.entries(patch).filter(([, value]) => value !== undefined));
  return { ...frame, ...(told as Partial<typeof frame>) };
}

/** Where the corrected frame looked. What is not told follows from a new object; failing that, it stays as it was. */
async function placeOf(seen: FrameRow, merged: Merged, patch: FrameCorrection): Promise<Completed> {
  const isMoved = (['type', 'object', 'field'] as const).some((key) => merged[key] !== seen[key]);
  const looksUp = isMoved || patch.ra === null;
  const told = {
    type: merged.type,
    object: merged.object,
    field: patch.field === undefined && isMoved ? undefined : merged.field,
    programme: patch.programme === undefined && isMoved ? undefined : merged.programme,
    ra: patch.ra === undefined && looksUp ? undefined : merged.ra,
    dec: patch.ra === undefined && looksUp ? undefined : merged.dec,
  };
  // A name that several programmes share stays with the one that the frame has.
  const [free, kept] = await completeFrames([told, { ...told, programme: merged.programme }]);
  const found = free && free.issues.length === 0 ? free : kept;
  if (!found) throw new Error('A frame was completed to nothing.');
  const { place } = found;
  const keepsPlace = place.ra === null && patch.ra === undefined;
  const keepsProgramme = place.programmeId === null && patch.programme === undefined;
  return {
    issues: found.issues,
    place: {
      ...place,
      ...(keepsPlace ? { ra: seen.ra, decl: seen.decl } : {}),
      ...(keepsProgramme ? { programmeId: seen.programmeId } : {}),
    },
  };
}

function ownIssues(merged: Merged, night: NightRow, instrument: InstrumentRow): readonly Issue[] {
  const bands = instrument.filters.map(({ band }) => band);
  const inNight = { ...boundsOf(night), telescope: instrument.name, bands };
  return [...frameFaults(merged), ...frameFaultsInNight(merged, inNight)].map(([path, message]) => ({
    path,
    value: String(merged[path] ?? ''),
    message,
  }));
}

function refuse(issues: readonly Issue[]): void {
  if (issues.length > 0)
    throw new Fault('invalid-input', 'The frame cannot be corrected like this.', { issues });
}

async function clashes(tx: Tx, nightId: number, frameId: number, merged: Merged): Promise<readonly Issue[]> {
  const files = merged.file === null ? [] : [merged.file];
  const others = (await framesInTheWay(tx, nightId, { numbers: [merged.number], files })).filter(
    ({ id }) => id !== frameId,
  );
  return others.map((other): Issue =>
    other.number === merged.number
      ? { path: 'number', value: String(merged.number), message: 'is the number of another frame in the log' }
      : {
          path: 'file',
          value: merged.file ?? '',
          message: `is the file of frame ${other.number} in the log`,
        },
  );
}

/** The present values of the fields that the correction would have changed. */
async function stale(tx: Tx | null, row: FrameRow, patch: FrameCorrection): Promise<Fault> {
  const frame = toFrame(row);
  const who = await lastChangeWords(tx, { kind: 'frame', publicId: row.publicId }, [
    'frame.log',
    'frame.correct',
  ]);
  const fields = (Object.keys(patch) as (keyof FrameCorrection)[]).filter(
    (key): key is Exclude<keyof FrameCorrection, 'version' | 'reason'> =>
      key !== 'version' && key !== 'reason',
  );
  const issues = fields.map((path): Issue => ({
    path,
    value: String(frame[path] ?? ''),
    message: 'is the present value',
  }));
  return new Fault(
    'stale',
    `Frame ${row.number} was changed${who} since you read it. Look at it again, then repeat yours.`,
    {
      issues: [...issues, { path: 'version', value: String(row.version), message: 'is the present version' }],
    },
  );
}
