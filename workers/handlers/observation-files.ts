import { writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { ObservationResults } from '@/lib/photometry/night-solution';
import type { SolvedNight } from '@/lib/server/acts/record-solution';
import type { SolveInputs } from '@/lib/server/reads/solve-inputs';
import { bandOf } from './solved-bands';

/** Rows of a file: the database's connector sends each file as one packet. */
const rowsPerFile = 20_000;
const longestReason = 500;

/** Leaves a line for every observation in files of the folder, in the columns of `observationColumns`. */
export async function writeObservations(
  inputs: SolveInputs,
  results: ObservationResults,
  folder: string,
): Promise<SolvedNight['slices']> {
  const line = observationLine(inputs, results);
  const n = inputs.observations.instMag.length;
  const slices: { file: string; rows: number }[] = [];
  for (let first = 0; first < n; first += rowsPerFile) {
    const rows = Math.min(rowsPerFile, n - first);
    const file = path.join(folder, `observations-${slices.length}.tsv`);
    await writeFile(file, Array.from({ length: rows }, (_, row) => line(first + row)).join(''));
    slices.push({ file, rows });
  }
  return slices;
}

const figure = (value: number | undefined): string =>
  value === undefined || !Number.isFinite(value) ? '\\N' : String(value);
/** A text as LOAD DATA reads it back. */
const text = (value: string): string =>
  value.slice(0, longestReason).replace(/[\\\t\n]/g, (sign) => (sign === '\n' ? '\\n' : `\\${sign}`));

function observationLine(
  { observations, keys, exclusions }: SolveInputs,
  results: ObservationResults,
): (row: number) => string {
  const decisions = new Map(exclusions.map((row) => [`${row.setId}.${row.rowNo}`, row]));
  return (row) => {
    const decision = decisions.get(`${keys.setId[row]}.${keys.rowNo[row]}`);
    const cells = [
      String(row),
      figure(keys.setId[row]),
      figure(keys.rowNo[row]),
      figure(keys.frameId[row]),
      figure(keys.standardId[row]),
      bandOf(observations.band[row] ?? -1),
      figure(observations.airmass[row]),
      figure(results.colour[row]),
      figure(results.magnitude[row]),
      figure(observations.hours[row]),
      figure(observations.instMag[row]),
      figure(observations.instErr[row]),
      figure(results.residual[row]),
      figure(results.standardised[row]),
      figure(results.weight[row]),
      figure(results.leverage[row]),
      figure(results.influence[row]),
      figure(results.used[row]),
      // A person's own words say more than that a person decided.
      text(decision?.reason ?? results.reasonWords[row] ?? ''),
      figure(decision?.personId),
    ];
    return `${cells.join('\t')}\n`;
  };
}
