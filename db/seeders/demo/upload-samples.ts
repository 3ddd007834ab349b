import { createReadStream } from 'node:fs';
import { isFault, type FaultCode } from '@/lib/faults/fault';
import { UploadQuery } from '@/lib/contracts/api/measurement-set';
import { receiveMeasurements } from '@/lib/server/acts/receive-measurements';
import { storeMeasurements } from '@/lib/server/acts/store-measurements';
import { callerOf } from '@/lib/server/identity/caller';
import { Night } from '../../models/night';
import { Person } from '../../models/person';
import { fixturePath } from '../fixture-files';

/** What is uploaded when the demo begins: both tables of the good nights, of the cloudy one the standards only. */
const samples = [
  { night: '2026-10-17', file: '2026-10-17-standards.csv', kind: 'standard', name: 'Standards' },
  { night: '2026-10-17', file: '2026-10-17-targets.csv', kind: 'target', name: 'Programme targets' },
  { night: '2026-11-03', file: '2026-11-03-standards.csv', kind: 'standard', name: 'Standards' },
  { night: '2026-11-03', file: '2026-11-03-targets.csv', kind: 'target', name: 'Programme targets' },
  { night: '2026-11-08', file: '2026-11-08-standards.csv', kind: 'standard', name: 'Standards' },
] as const;

const theirs: ReadonlySet<FaultCode> = new Set(['conflict', 'not-allowed', 'not-found']);

/**
 * Uploads the demo's tables in the observer's name, by the acts that every upload goes through; the jobs that check them
 * run when the application does. A table that is there already is left alone. Returns how many were uploaded.
 */
export async function uploadSamples(observerEmail: string): Promise<number> {
  const person = await Person.findOne({ where: { email: observerEmail }, rejectOnEmpty: true });
  const caller = await callerOf(person.id, { via: 'session', requestId: 'demo' });
  // Somebody may have closed the account while trying the program out.
  if (caller === null) return 0;
  let uploaded = 0;
  for (const { night: date, file, kind, name } of samples) {
    const night = await Night.findOne({ where: { date }, rejectOnEmpty: true });
    try {
      const stored = await storeMeasurements(
        caller,
        night.publicId,
        createReadStream(fixturePath(`uploads/${file}`)),
      );
      const query = UploadQuery.parse({ kind, name });
      await receiveMeasurements(caller, night.publicId, query, {
        ...stored,
        fileName: file,
        contentType: 'text/csv',
      });
      uploaded += 1;
    } catch (error) {
      // The same bytes are in the night from an earlier run, or its people were changed since: both are theirs to keep.
      if (!isFault(error) || !theirs.has(error.code)) throw error;
    }
  }
  return uploaded;
}
