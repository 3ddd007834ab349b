import 'server-only';
import { Fault } from '@/lib/faults/fault';
import { programmesInNight } from '@/lib/server/data/measurement-sets';
import { requireNight, subjectOf } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';
import { environment } from '@/lib/server/settings/environment';
import { storeOriginal, type StoredOriginal } from '@/lib/server/storage/originals';

/** Whether the caller may upload to the night; who may not hears so before the first byte is kept. */
export async function demandUpload(caller: PersonCaller, night: string): Promise<void> {
  const row = await requireNight(nightScope(caller), night);
  demand(caller, 'measurements.upload', { ...subjectOf(row), programmeIds: await programmesInNight(row.id) });
}

/** Takes the bytes of a table to disk, under their hash. Nothing else is known of them until `receiveMeasurements`. */
export async function storeMeasurements(
  caller: PersonCaller,
  night: string,
  bytes: AsyncIterable<Uint8Array>,
): Promise<StoredOriginal> {
  await demandUpload(caller, night);
  try {
    return await storeOriginal(bytes, environment().uploadLimit_bytes);
  } catch (error) {
    // The stream of a client that went away ends with an error of its own kind, depending on where it broke.
    if (error instanceof Error && error.message === 'aborted') {
      throw new Fault('invalid-input', 'The upload ended before the file was complete.', { cause: error });
    }
    throw error;
  }
}
