import 'server-only';
import type { Slice } from '@/lib/contracts/measurement-check';
import { Fault, isFault } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import { nightById, type NightName } from '@/lib/server/data/night-names';
import { bandsOfNight, type BandRow } from '@/lib/server/data/solution-bands';
import {
  dropTransformations,
  finishTransformation,
  hasEarlierMagnitudes,
  investigatorsOf,
  loadStars,
  lockSolutionState,
  type TransformationRow,
  type TransformedSolutionRow,
} from '@/lib/server/data/transformation-runs';
import { demandLease } from '@/lib/server/jobs/lease';
import { nightWords } from '@/lib/server/mail/measurement-words';
import { nightCalibratedMail } from '@/lib/server/mail/night-calibrated';
import { postMail } from '@/lib/server/mail/post-mail';
import type { JobCaller } from '@/lib/server/policy/caller';
import { environment } from '@/lib/server/settings/environment';

/** Of which solution and night the magnitudes are. */
export interface CalibratedNight {
  readonly solution: Pick<TransformedSolutionRow, 'id' | 'publicId' | 'number' | 'verdict'>;
  readonly nightId: number;
  readonly transformations: readonly TransformationRow[];
  readonly options: object;
}

/** Magnitudes of one programme, in files. */
export interface NewCalibrated {
  /** Internal id of the transformation. */
  readonly id: number;
  readonly nStars: number;
  readonly nMeasurements: number;
  readonly nLeftOut: number;
  readonly slices: readonly Slice[];
}

export interface CalibratedStore {
  readonly results: readonly NewCalibrated[];
  /** Told after every statement with the stars that are in so far; what it throws undoes all of it. */
  readonly onRows: (rows: number) => void;
}

/**
 * Stores a night's magnitudes with the mails that tell of them, all in one transaction. False, and nothing happens, when
 * the solution is not the approved one: withdrawn or replaced, before or meanwhile. The solution is held only at the end,
 * so that whoever withdraws it does not wait for the load.
 */
export async function storeCalibrated(
  caller: JobCaller,
  night: CalibratedNight,
  { results, onRows }: CalibratedStore,
): Promise<boolean> {
  try {
    await inTransaction(async (tx) => {
      let rows = 0;
      for (const { id, slices } of results) {
        for (const slice of slices) {
          await loadStars(tx, id, slice);
          rows += slice.rows;
          onRows(rows);
        }
      }
      if ((await lockSolutionState(tx, night.solution.id)) !== 'approved')
        throw new Fault('stale', 'The solution is no longer the approved one.');
      await finish(tx, caller, night, results);
      await demandLease(tx, caller);
    });
    return true;
  } catch (error) {
    // Thrown above, to undo what was loaded.
    if (isFault(error, 'stale')) return false;
    throw error;
  }
}

async function finish(
  tx: Tx,
  caller: JobCaller,
  night: CalibratedNight,
  results: readonly NewCalibrated[],
): Promise<void> {
  const { solution, nightId, transformations, options } = night;
  const [name, bands] = [await nightById(nightId, tx), await bandsOfNight(solution.id, nightId, tx)];
  for (const result of results) {
    if (!(await finishTransformation(tx, { ...result, options })))
      throw new Error(`The transformation ${result.id} was ended by somebody else.`);
    const transformation = transformations.find(({ id }) => id === result.id);
    if (transformation) await tellInvestigators(tx, night, { name, bands, transformation, result });
  }
  await recordAudit(tx, caller, {
    act: 'solution.transform',
    subjectKind: 'solution',
    subjectId: solution.publicId,
    nightId,
    after: {
      programmes: results.length,
      stars: results.reduce((sum, { nStars }) => sum + nStars, 0),
      measurements: results.reduce((sum, { nMeasurements }) => sum + nMeasurements, 0),
    },
  });
}

interface News {
  readonly name: NightName;
  readonly bands: readonly BandRow[];
  readonly transformation: TransformationRow;
  readonly result: NewCalibrated;
}

async function tellInvestigators(tx: Tx, night: CalibratedNight, news: News): Promise<void> {
  const { name, transformation, result } = news;
  const { programmeId, programme } = transformation;
  if (programmeId === null || programme === null) return;
  const isAgain = await hasEarlierMagnitudes(tx, transformation.id);
  for (const person of await investigatorsOf(tx, programmeId)) {
    const mail = nightCalibratedMail({
      ...result,
      name: person.name,
      night: nightWords(name),
      programme,
      verdict: night.solution.verdict ?? 'none',
      solution: night.solution.number,
      bands: news.bands,
      isAgain,
      href: `${environment().baseUrl}/nights/${name.publicId}/results?programme=${encodeURIComponent(programme)}`,
    });
    await postMail(tx, {
      ...mail,
      dedupeKey: `night-calibrated:${transformation.publicId}:${person.personId}`,
      to: person,
    });
  }
}

/** Ends what is still queued for a solution that is no longer the approved one. */
export async function dropCalibrated(caller: JobCaller, night: CalibratedNight): Promise<void> {
  await inTransaction(async (tx) => {
    // It may have been approved since the job looked: then its magnitudes are wanted.
    if ((await lockSolutionState(tx, night.solution.id)) === 'approved')
      throw new Error('The solution was not approved a moment ago, and is now.');
    await dropTransformations(tx, night.solution.id, night.nightId);
    await demandLease(tx, caller);
  });
}
