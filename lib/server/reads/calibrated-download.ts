import 'server-only';
import { createHash } from 'node:crypto';
import packageFile from '@/package.json';
import type { CalibratedQuery } from '@/lib/contracts/api/calibrated';
import {
  calibratedCautions,
  calibratedColumns,
  calibratedFormulas,
} from '@/lib/contracts/calibrated-columns';
import { transformOptionWords } from '@/lib/contracts/transform-options';
import { Fault } from '@/lib/faults/fault';
import { csvRow, exportedCells, jsonRow } from '@/lib/formats/calibrated-rows';
import { provenanceJson, provenanceLines, type Provenance } from '@/lib/formats/provenance';
import { calibratedChunks, standardsUsed } from '@/lib/server/data/calibrated-chunks';
import { listResultRows, type ResultRow } from '@/lib/server/data/calibrated-results';
import { nightById } from '@/lib/server/data/night-names';
import { requireNight, type NightRow } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';

type Format = CalibratedQuery['format'];

export interface CalibratedDownload {
  /** For the file, without its ending. */
  readonly name: string;
  readonly text: AsyncGenerator<string>;
}

/**
 * A night's calibrated magnitudes as a file, begun by its provenance. The checksum stands before the rows that it is of:
 * they are read twice. A result never changes once it is made, so both passes see the same.
 */
export async function calibratedDownload(
  caller: Caller,
  id: string,
  query: CalibratedQuery,
): Promise<CalibratedDownload> {
  const scope = dataScope(caller);
  const night = await requireNight(scope, id);
  const results = chosenResults(await listResultRows(scope, night.id), query);
  const [first] = results;
  if (!first) throw new Fault('not-found', notThere);
  const rows = (): AsyncGenerator<string> => dataRows(night, results, query.format);
  const hash = createHash('sha256');
  for await (const text of rows()) hash.update(text);
  const sha256 = hash.digest('hex');
  const head = await provenanceOf(night, results, { first, sha256, format: query.format });
  const code = results.length === 1 ? (first.programme ?? 'no-programme') : 'all';
  return {
    name: `${night.telescope}-${night.date}-${code}-solution-${first.number}`,
    text: query.format === 'csv' ? csvFile(head, rows()) : jsonFile(head, rows()),
  };
}

const notThere = 'There are no such magnitudes of the night, or they are not yours to see.';

/** Results of one solution: the approved one, or the one that is named. */
function chosenResults(all: readonly ResultRow[], query: CalibratedQuery): readonly ResultRow[] {
  const own = all.filter(
    (row) =>
      (query.programme === undefined || (row.programme ?? '') === query.programme) &&
      (query.solution === undefined ? row.solutionState === 'approved' : row.solution === query.solution),
  );
  if (own.some(({ state }) => state === 'queued')) {
    throw new Fault(
      'conflict',
      'The magnitudes of this solution are still being made. Ask again, or name an earlier solution.',
    );
  }
  return own;
}

/** Text of the rows in pieces; the items of JSON are parted, so that the pieces together are what the checksum is of. */
async function* dataRows(
  night: NightRow,
  results: readonly ResultRow[],
  format: Format,
): AsyncGenerator<string> {
  let isFirst = true;
  for (const { id, programme, solution } of results) {
    const names = { programme: programme ?? '', solution, night: night.date };
    for await (const rows of calibratedChunks(id)) {
      let text = '';
      // Row by row: what all rows of a chunk held at once would outlive the collector's first look.
      for (const [, ...row] of rows) {
        const cells = exportedCells(row, names);
        if (format === 'csv') text += csvRow(cells);
        else text += `${isFirst ? '' : ',\n'}${jsonRow(cells)}`;
        isFirst = false;
      }
      yield text;
    }
  }
}

async function* csvFile(head: Provenance, rows: AsyncGenerator<string>): AsyncGenerator<string> {
  yield `${provenanceLines(head)}${calibratedColumns.map(({ name }) => name).join(',')}\r\n`;
  yield* rows;
}

async function* jsonFile(head: Provenance, rows: AsyncGenerator<string>): AsyncGenerator<string> {
  yield provenanceJson(head);
  yield* rows;
  yield '\n]}\n';
}

interface Export {
  readonly first: ResultRow;
  readonly sha256: string;
  readonly format: Format;
}

const hashed: Readonly<Record<Format, string>> = {
  csv: 'every byte after the line of column names',
  json: 'every byte between the line that opens items and the line feed before the bracket that closes it',
};

/** Each once: programmes of a night are transformed together, but those of an earlier day may differ. */
const optionsOf = (results: readonly ResultRow[]): readonly string[] => [
  ...new Set(results.flatMap(({ options }) => (options === null ? [] : transformOptionWords(options)))),
];

async function provenanceOf(
  night: NightRow,
  results: readonly ResultRow[],
  { first, sha256, format }: Export,
): Promise<Provenance> {
  const [name, standards] = await Promise.all([nightById(night.id), standardsUsed(first.solution, night.id)]);
  return {
    columns: calibratedColumns,
    facts: {
      observatory: name.observatory,
      site: name.siteName,
      telescope: `${name.telescope} (${name.telescopeName})`,
      night: night.date,
      programme: results.map(({ programme }) => programme ?? 'none'),
      solution: first.solution,
      solution_number: first.number,
      solution_state: first.solutionState,
      solution_software: first.softwareVersion,
      verdict: first.verdict,
      approved_by: 'a photometrist of the observatory',
      approved_at: first.approvedAt?.toISOString() ?? null,
      standards_source: first.standardsSource,
      standards_used: standards.map(({ source, names }) => `${source}: ${names}`),
      formulas: calibratedFormulas,
      options: optionsOf(results),
      cautions: calibratedCautions(first.verdict),
      software: `Evenfall ${packageFile.version}`,
      exported_at: new Date().toISOString(),
      sha256,
      sha256_of: hashed[format],
    },
  };
}
