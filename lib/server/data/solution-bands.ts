import 'server-only';
import { database } from '@/db/connection';
import type { SolutionBand, SolutionCoefficient } from '@/lib/contracts/api/solution';
import type { Band } from '@/lib/contracts/bands';
import { insert, select, type Tx } from './database';

export interface StoredCoefficient {
  readonly name: SolutionCoefficient['name'];
  readonly status: SolutionCoefficient['status'];
  readonly value: number | null;
  readonly error: number | null;
  readonly interval95: number | null;
  readonly varianceInflation: number | null;
  readonly priorValue: number | null;
  readonly priorError: number | null;
}

/** One band of one night of a solution, as it is stored. */
export interface StoredBand {
  readonly nightId: number;
  readonly band: Band;
  readonly colourIndex: string;
  readonly outcome: 'determined' | 'undetermined';
  readonly covariance: readonly (readonly number[])[];
  readonly correlation: readonly (readonly (number | null)[])[];
  readonly scatterObservation: number | null;
  readonly scatterFrame: number | null;
  readonly nUsed: number;
  readonly nRejected: number;
  readonly nStars: number;
  readonly nFrames: number;
  readonly dof: number | null;
  readonly reducedChi2: number | null;
  readonly conditionNumber: number | null;
  readonly airmassMin: number | null;
  readonly airmassMax: number | null;
  readonly colourMin: number | null;
  readonly colourMax: number | null;
  readonly utcFirst: Date | null;
  readonly utcLast: Date | null;
  readonly leaveOneStarOut: number | null;
  readonly driftValue: number | null;
  readonly driftError: number | null;
  readonly runs: number | null;
  readonly crossChecks: SolutionBand['cross_checks'];
  readonly warnings: readonly string[];
  readonly coefficients: readonly StoredCoefficient[];
}

/** Writes a band with its coefficients, in their order. */
export async function insertBand(tx: Tx, solutionId: number, band: StoredBand): Promise<void> {
  const { coefficients, covariance, correlation, crossChecks, warnings, ...columns } = band;
  const id = await insert(
    `INSERT INTO solution_bands
       (solution_id, night_id, band, colour_index, outcome, covariance, correlation, scatter_observation, scatter_frame,
        n_used, n_rejected, n_stars, n_frames, dof, reduced_chi2, condition_number, airmass_min, airmass_max,
        colour_min, colour_max, utc_first, utc_last, leave_one_star_out, drift_value, drift_error, runs,
        cross_checks, warnings)
     VALUES
       (:solutionId, :nightId, :band, :colourIndex, :outcome, :covariance, :correlation, :scatterObservation, :scatterFrame,
        :nUsed, :nRejected, :nStars, :nFrames, :dof, :reducedChi2, :conditionNumber, :airmassMin, :airmassMax,
        :colourMin, :colourMax, :utcFirst, :utcLast, :leaveOneStarOut, :driftValue, :driftError, :runs,
        :crossChecks, :warnings)`,
    {
      ...columns,
      solutionId,
      covariance: JSON.stringify(covariance),
      correlation: JSON.stringify(correlation),
      crossChecks: JSON.stringify(crossChecks),
      warnings: JSON.stringify(warnings),
    },
    tx,
  );
  if (coefficients.length === 0) return;
  await database()
    .getQueryInterface()
    .bulkInsert(
      'solution_coefficients',
      coefficients.map((coefficient, seq) => ({
        solution_band_id: id,
        seq,
        name: coefficient.name,
        status: coefficient.status,
        value: coefficient.value,
        error: coefficient.error,
        interval95: coefficient.interval95,
        variance_inflation: coefficient.varianceInflation,
        prior_value: coefficient.priorValue,
        prior_error: coefficient.priorError,
      })),
      { transaction: tx },
    );
}

export interface BandRow extends StoredBand {
  readonly solutionId: number;
  readonly nightPublicId: string;
  readonly nightDate: string;
}

/** Bands of the solutions with their coefficients, by night, blue to red. */
export async function bandsOf(
  solutionIds: readonly number[],
  tx: Tx | null = null,
): Promise<readonly BandRow[]> {
  if (solutionIds.length === 0) return [];
  const bands = await select<Omit<BandRow, 'coefficients'> & { readonly id: number }>(
    `SELECT b.id, b.solution_id AS solutionId, b.night_id AS nightId, n.public_id AS nightPublicId,
            DATE_FORMAT(n.date, '%Y-%m-%d') AS nightDate, b.band, b.colour_index AS colourIndex, b.outcome,
            b.covariance, b.correlation, b.scatter_observation AS scatterObservation, b.scatter_frame AS scatterFrame,
            b.n_used AS nUsed, b.n_rejected AS nRejected, b.n_stars AS nStars, b.n_frames AS nFrames, b.dof,
            b.reduced_chi2 AS reducedChi2, b.condition_number AS conditionNumber,
            b.airmass_min AS airmassMin, b.airmass_max AS airmassMax, b.colour_min AS colourMin,
            b.colour_max AS colourMax, b.utc_first AS utcFirst, b.utc_last AS utcLast,
            b.leave_one_star_out AS leaveOneStarOut, b.drift_value AS driftValue, b.drift_error AS driftError, b.runs,
            b.cross_checks AS crossChecks, b.warnings
       FROM solution_bands b JOIN nights n ON n.id = b.night_id
      WHERE b.solution_id IN (:solutionIds)
      ORDER BY b.solution_id, n.date, FIELD(b.band, 'U', 'B', 'V', 'R', 'I')`,
    { solutionIds },
    tx,
  );
  if (bands.length === 0) return [];
  const coefficients = await select<StoredCoefficient & { readonly bandId: number }>(
    `SELECT k.solution_band_id AS bandId, k.name, k.status, k.value, k.error, k.interval95,
            k.variance_inflation AS varianceInflation, k.prior_value AS priorValue, k.prior_error AS priorError
       FROM solution_coefficients k JOIN solution_bands b ON b.id = k.solution_band_id
      WHERE b.solution_id IN (:solutionIds) ORDER BY k.solution_band_id, k.seq`,
    { solutionIds },
    tx,
  );
  const ofBand = new Map<number, StoredCoefficient[]>();
  for (const { bandId, ...coefficient } of coefficients) {
    ofBand.set(bandId, [...(ofBand.get(bandId) ?? []), coefficient]);
  }
  return bands.map(({ id, ...band }) => ({ ...band, coefficients: ofBand.get(id) ?? [] }));
}

/** What a solution found for the bands of one of its nights, blue to red. */
export async function bandsOfNight(
  solutionId: number,
  nightId: number,
  tx: Tx | null = null,
): Promise<readonly BandRow[]> {
  return (await bandsOf([solutionId], tx)).filter((band) => band.nightId === nightId);
}
