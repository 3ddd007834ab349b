import 'server-only';
import type { Band } from '@/lib/contracts/bands';
import { select, type Tx } from './database';

export interface SolveNight {
  readonly id: number;
  readonly publicId: string;
  readonly date: string;
}

/** The nights that a solution joins: its own first, then by date. */
export async function nightsOfSolution(
  solutionId: number,
  tx: Tx | null = null,
): Promise<readonly SolveNight[]> {
  return select<SolveNight>(
    `SELECT n.id, n.public_id AS publicId, DATE_FORMAT(n.date, '%Y-%m-%d') AS date
       FROM solution_nights w JOIN nights n ON n.id = w.night_id JOIN solutions s ON s.id = w.solution_id
      WHERE w.solution_id = :solutionId ORDER BY n.id = s.night_id DESC, n.date`,
    { solutionId },
    tx,
  );
}

export interface SolveSet {
  readonly id: number;
  readonly publicId: string;
  readonly name: string;
  readonly sha256: string;
}

/** Sets of the nights that hold matched standards. A set of targets holds none, whatever its stars are called. */
export async function setsWithStandards(
  nightIds: readonly number[],
  tx: Tx | null = null,
): Promise<readonly SolveSet[]> {
  return select<SolveSet>(
    `SELECT id, public_id AS publicId, name, sha256 FROM measurement_sets
      WHERE night_id IN (:nightIds) AND kind IN ('standard', 'mixed') AND state IN ('matched', 'in use')
        AND n_matched > 0
      ORDER BY id`,
    { nightIds },
    tx,
  );
}

export interface SolveFrame {
  readonly id: number;
  readonly nightId: number;
  readonly number: number;
  readonly band: Band | null;
  readonly utcStart: Date;
  readonly utcMid: Date;
  /** [s] */
  readonly exposure: number;
  readonly version: number;
}

/** Frames on which the sets have rows, in order of time. */
export async function framesOfSets(setIds: readonly number[]): Promise<readonly SolveFrame[]> {
  if (setIds.length === 0) return [];
  return select<SolveFrame>(
    `SELECT f.id, f.night_id AS nightId, f.number, f.band, f.utc_start AS utcStart, f.utc_mid AS utcMid,
            f.exposure, f.version
       FROM frames f
      WHERE f.id IN (SELECT q.frame_id FROM measurement_set_frames q WHERE q.set_id IN (:setIds))
      ORDER BY f.utc_mid, f.number, f.id`,
    { setIds },
  );
}

/** Measurements of standards, column by column: there can be several hundred thousand. */
export interface StandardColumns {
  readonly setId: number[];
  readonly rowNo: number[];
  readonly frameId: number[];
  readonly standardId: number[];
  readonly instMag: number[];
  readonly instErr: number[];
}
type StandardRow = { readonly [Name in keyof StandardColumns]: number };

/** Rows that are read at once: no more of them are objects at a time. */
const page = 20_000;

/** Rows of a set that are usable standards, added to the columns in the order of the file. */
export async function readStandardRows(setId: number, into: StandardColumns): Promise<void> {
  for (let after = 0; ;) {
    const rows = await select<StandardRow>(
      `SELECT r.set_id AS setId, r.row_no AS rowNo, r.frame_id AS frameId, w.standard_id AS standardId,
              r.inst_mag AS instMag, r.inst_err AS instErr
         FROM measurements r
         JOIN measurement_stars w ON w.set_id = r.set_id AND w.star_no = r.star_no
         JOIN standard_stars d ON d.id = w.standard_id AND d.is_usable = 1
        WHERE r.set_id = :setId AND r.row_no > :after ORDER BY r.row_no LIMIT :page`,
      { setId, after, page },
    );
    for (const row of rows) {
      for (const name of Object.keys(into) as (keyof StandardColumns)[]) into[name].push(row[name]);
    }
    const last = rows.at(-1);
    if (last === undefined || rows.length < page) return;
    after = last.rowNo;
  }
}

export interface PublishedStar {
  readonly id: number;
  readonly name: string;
  /** J2000, at the epoch 2000.0 [deg] */
  readonly ra: number;
  readonly dec: number;
  /** [mas/yr] */
  readonly pmRa: number | null;
  readonly pmDec: number | null;
  readonly v: number;
  readonly bv: number;
  readonly ub: number | null;
  readonly vr: number | null;
  readonly vi: number | null;
  /** Standard errors; that of the table where a star has none of its own. [mag] */
  readonly eV: number;
  readonly eBv: number;
  readonly eUb: number;
  readonly eVr: number;
  readonly eVi: number;
  readonly citation: string;
}

/** Published magnitudes and places of the standards. */
export async function publishedStars(ids: readonly number[]): Promise<readonly PublishedStar[]> {
  if (ids.length === 0) return [];
  return select<PublishedStar>(
    `SELECT s.id, s.name, s.ra, s.decl AS \`dec\`, s.pm_ra AS pmRa, s.pm_dec AS pmDec,
            s.v, s.bv, s.ub, s.vr, COALESCE(s.vi, s.vr + s.ri) AS vi,
            COALESCE(s.e_v, o.default_error) AS eV, COALESCE(s.e_bv, o.default_error) AS eBv,
            COALESCE(s.e_ub, o.default_error) AS eUb, COALESCE(s.e_vr, o.default_error) AS eVr,
            COALESCE(s.e_vi, o.default_error) AS eVi, o.citation
       FROM standard_stars s JOIN standard_sources o ON o.id = s.source_id
      WHERE s.id IN (:ids) ORDER BY s.id`,
    { ids },
  );
}

export interface BandTally {
  readonly nightId: number;
  readonly band: Band;
  readonly nObservations: number;
  readonly nStars: number;
  readonly nFrames: number;
}

/** How many usable standards the nights have in each band. */
export async function tallyStandards(
  nightIds: readonly number[],
  tx: Tx | null = null,
): Promise<readonly BandTally[]> {
  const sets = await setsWithStandards(nightIds, tx);
  if (sets.length === 0) return [];
  const rows = await select<BandTally>(
    `SELECT f.night_id AS nightId, f.band, COUNT(*) AS nObservations,
            COUNT(DISTINCT w.standard_id) AS nStars, COUNT(DISTINCT f.id) AS nFrames
       FROM measurement_stars w
       JOIN standard_stars d ON d.id = w.standard_id AND d.is_usable = 1
       JOIN measurements r ON r.set_id = w.set_id AND r.star_no = w.star_no
       JOIN frames f ON f.id = r.frame_id
      WHERE w.set_id IN (:setIds) AND f.band IS NOT NULL
      GROUP BY f.night_id, f.band ORDER BY f.night_id, FIELD(f.band, 'U', 'B', 'V', 'R', 'I')`,
    { setIds: sets.map(({ id }) => id) },
    tx,
  );
  return rows.map((row) => ({
    ...row,
    nObservations: Number(row.nObservations),
    nStars: Number(row.nStars),
    nFrames: Number(row.nFrames),
  }));
}

export interface MatchedRow {
  readonly setId: number;
  readonly rowNo: number;
}

/** Those of the rows, given as set and row number, that are usable standards of the nights. */
export async function matchedRows(
  tx: Tx,
  nightIds: readonly number[],
  wanted: readonly { readonly set: string; readonly rowNo: number }[],
): Promise<ReadonlyMap<string, MatchedRow>> {
  if (wanted.length === 0) return new Map();
  const found = new Map<string, MatchedRow>();
  for (const set of await setsWithStandards(nightIds, tx)) {
    const rowNos = wanted.filter((row) => row.set === set.publicId).map(({ rowNo }) => rowNo);
    if (rowNos.length === 0) continue;
    const rows = await select<MatchedRow>(
      `SELECT r.set_id AS setId, r.row_no AS rowNo
         FROM measurements r
         JOIN measurement_stars w ON w.set_id = r.set_id AND w.star_no = r.star_no
         JOIN standard_stars d ON d.id = w.standard_id AND d.is_usable = 1
        WHERE r.set_id = :setId AND r.row_no IN (:rowNos)`,
      { setId: set.id, rowNos },
      tx,
    );
    for (const row of rows) found.set(`${set.publicId}.${row.rowNo}`, row);
  }
  return found;
}

export interface Epoch {
  readonly id: number;
  readonly description: string;
}

/** The equipment epoch of a telescope at a date; null where none is recorded. */
export async function epochAt(
  telescopeId: number,
  date: string,
  tx: Tx | null = null,
): Promise<Epoch | null> {
  const rows = await select<Epoch>(
    `SELECT id, description FROM equipment_epochs
      WHERE telescope_id = :telescopeId AND starts_on <= :date AND (ends_on IS NULL OR ends_on > :date)
      ORDER BY starts_on DESC LIMIT 1`,
    { telescopeId, date },
    tx,
  );
  return rows[0] ?? null;
}

/** Citations of the standards that the sets hold. */
export async function sourcesOfSets(setIds: readonly number[], tx: Tx | null = null): Promise<string> {
  if (setIds.length === 0) return '';
  const rows = await select<{ citation: string }>(
    `SELECT DISTINCT o.citation FROM measurement_stars w
       JOIN standard_stars d ON d.id = w.standard_id
       JOIN standard_sources o ON o.id = d.source_id
      WHERE w.set_id IN (:setIds) ORDER BY o.id`,
    { setIds },
    tx,
  );
  return rows.map(({ citation }) => citation).join('; ');
}
