import 'server-only';
import type { CheckResult } from '@/lib/contracts/measurement-check';
import { recordAudit } from '@/lib/server/data/audit';
import { uploaderOf } from '@/lib/server/data/check-notices';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { replaceFaults } from '@/lib/server/data/measurement-loads';
import { lockSet, moveSet, requireSet, type MeasurementSetRow } from '@/lib/server/data/measurement-sets';
import { demandLease } from '@/lib/server/jobs/lease';
import { nightWords, setLink } from '@/lib/server/mail/measurement-words';
import { postMail } from '@/lib/server/mail/post-mail';
import { uploadRefusedMail } from '@/lib/server/mail/upload-refused';
import type { JobCaller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';

/** Refuses a table with everything that is wrong with it, and tells whoever uploaded it. Nothing of it was loaded. */
export async function recordRefusedSet(caller: JobCaller, id: string, result: CheckResult): Promise<void> {
  await inTransaction(async (tx) => {
    const set = await requireSet(dataScope(caller), id, tx);
    // Run again after a crash: the first run's word stands.
    if ((await lockSet(tx, set.id)) === 'refused') return;
    await moveSet(tx, set, {
      from: ['received', 'checked'],
      to: 'refused',
      set: {
        n_rows: result.rows,
        n_matched: 0,
        n_faults: result.nFaults,
        comments: result.comments,
        mapping: JSON.stringify(Object.keys(result.columns).length > 0 ? result.columns : set.mapping),
        checked_at: new Date(),
      },
    });
    await replaceFaults(tx, set.id, result.faults);
    await recordAudit(tx, caller, {
      act: 'measurements.check',
      subjectKind: 'measurement-set',
      subjectId: set.publicId,
      nightId: set.nightId,
      before: { state: set.state },
      after: { state: 'refused', rows: result.rows, faults: result.nFaults },
    });
    await tellUploader(tx, set, result);
    await demandLease(tx, caller);
  });
}

async function tellUploader(tx: Tx, set: MeasurementSetRow, result: CheckResult): Promise<void> {
  const uploader = await uploaderOf(set.uploadedById, tx);
  if (!uploader || uploader.isDisabled === 1) return;
  const mail = uploadRefusedMail({
    name: uploader.name,
    night: nightWords(set),
    fileName: set.fileName,
    nFaults: result.nFaults,
    // The letter puts a full stop between what is wrong and what to do.
    faults: result.faults
      .slice(0, 5)
      .map((fault) => ({ ...fault, message: fault.message.replace(/\.$/, '') })),
    href: setLink(set),
  });
  await postMail(tx, {
    ...mail,
    dedupeKey: `upload-refused:${set.publicId}:${uploader.personId}`,
    to: uploader,
  });
}
