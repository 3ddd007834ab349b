import 'server-only';
import type { Queued, UploadQuery } from '@/lib/contracts/api/measurement-set';
import { Fault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction } from '@/lib/server/data/database';
import { insertSet, programmesInNight, setWithBytes } from '@/lib/server/data/measurement-sets';
import { lockNight } from '@/lib/server/data/night-state';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import { newPublicId } from '@/lib/server/data/public-id';
import { enqueue } from '@/lib/server/jobs/enqueue';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';
import type { StoredOriginal } from '@/lib/server/storage/originals';

export interface ReceivedFile extends StoredOriginal {
  readonly fileName: string | null;
  readonly contentType: string;
}

/** Makes a measurement set of a stored table and queues its check: both, or neither. */
export async function receiveMeasurements(
  caller: PersonCaller,
  nightId: string,
  query: UploadQuery,
  file: ReceivedFile,
): Promise<Queued> {
  const night = await requireNight(nightScope(caller), nightId);
  demand(caller, 'measurements.upload', {
    ...subjectOf(night),
    programmeIds: await programmesInNight(night.id),
  });
  const fileName = oneLineName(query.file ?? file.fileName ?? '') || 'measurements.csv';
  const name = query.name ?? fileName.slice(0, 120);
  return inTransaction(async (tx) => {
    // Of two uploads at once the second waits here, and then finds the first.
    await lockNight(tx, night);
    const earlier = await setWithBytes(tx, night.id, file.sha256);
    if (earlier) throw sameBytes(earlier);
    const publicId = newPublicId();
    await insertSet(tx, {
      publicId,
      nightId: night.id,
      kind: query.kind,
      name,
      fileName,
      contentType: file.contentType,
      size: file.size,
      sha256: file.sha256,
      tolerance: query.tolerance,
      mapping: query.mapping ?? {},
      uploadedById: caller.personId,
    });
    const job = await enqueue(tx, caller, {
      kind: 'check-measurements',
      payload: { set: publicId },
      dedupeKey: `check-measurements:${publicId}`,
      nightId: night.id,
    });
    await recordAudit(tx, caller, {
      act: 'measurements.receive',
      subjectKind: 'measurement-set',
      subjectId: publicId,
      nightId: night.id,
      after: { name, kind: query.kind, file: fileName, size: file.size, sha256: file.sha256 },
    });
    return { set: publicId, job: job.id };
  });
}

/** A file's name without its folder, fit for a column and a download's header. */
const oneLineName = (name: string): string =>
  name
    .slice(Math.max(name.lastIndexOf('/'), name.lastIndexOf('\\')) + 1)
    .replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ')
    .trim()
    .slice(0, 255);

const sameBytes = ({ publicId, name }: { readonly publicId: string; readonly name: string }): Fault =>
  new Fault('conflict', `This file was uploaded to this night before, as the set “${name}” (${publicId}).`, {
    issues: [{ path: 'set', value: publicId, message: 'is the set that has these bytes' }],
  });
