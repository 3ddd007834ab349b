import 'server-only';
import packageFile from '@/package.json';
import type { SolutionInputs, SolutionModel } from '@/lib/contracts/solution-model';
import { recordAudit } from '@/lib/server/data/audit';
import type { Tx } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import {
  insertExclusions,
  insertSolution,
  insertSolutionNights,
  type ExclusionRow,
} from '@/lib/server/data/solution-writes';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { enqueue } from './enqueue';

export interface Draft {
  /** The caller of this holds it. */
  readonly night: { readonly id: number };
  /** Nights that are solved with it, internal ids. */
  readonly jointNightIds: readonly number[];
  readonly model: SolutionModel;
  readonly inputs: SolutionInputs;
  readonly exclusions: readonly ExclusionRow[];
  /** The solution that it was made from. */
  readonly follows: { readonly id: number; readonly publicId: string } | null;
  readonly reason?: string;
}

/** Writes a draft and the job that solves it, within the transaction that holds the night: both, or neither. */
export async function queueDraft(
  tx: Tx,
  caller: PersonCaller,
  draft: Draft,
): Promise<{ readonly solution: string; readonly job: string }> {
  const { night, follows, model } = draft;
  const publicId = newPublicId();
  const { id, number } = await insertSolution(tx, {
    publicId,
    nightId: night.id,
    model,
    inputs: draft.inputs,
    softwareVersion: packageFile.version,
    followsId: follows?.id ?? null,
    createdById: caller.personId,
  });
  await insertSolutionNights(tx, id, [night.id, ...draft.jointNightIds]);
  await insertExclusions(tx, id, draft.exclusions);
  const job = await enqueue(tx, caller, {
    kind: 'solve-night',
    payload: { solution: publicId },
    dedupeKey: `solve-night:${publicId}`,
    nightId: night.id,
  });
  await recordAudit(tx, caller, {
    act: 'solution.queue',
    subjectKind: 'solution',
    subjectId: publicId,
    nightId: night.id,
    reason: draft.reason ?? '',
    after: {
      number,
      bands: model.fit.bands.map(({ band }) => band),
      airmass_formula: model.airmassFormula,
      joint_nights: draft.jointNightIds.length,
      exclusions: draft.exclusions.length,
      follows: follows?.publicId ?? null,
    },
  });
  return { solution: publicId, job: job.id };
}
