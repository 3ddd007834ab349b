import 'server-only';
import type {
  MeasuredStar,
  MeasurementFault,
  MeasurementRow,
  StarsQuery,
} from '@/lib/contracts/api/measurement-set';
import type { List, Page } from '@/lib/contracts/common';
import type { MeasurementSummary } from '@/lib/contracts/set-page';
import { Fault } from '@/lib/faults/fault';
import {
  listFaultRows,
  listMeasurementRowRows,
  listStarRows,
  setFrames,
  tallyStars,
  type MeasuredStarRow,
} from '@/lib/server/data/measurement-lists';
import type { MeasurementSetRow } from '@/lib/server/data/measurement-sets';
import type { Caller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';
import { openOriginal } from '@/lib/server/storage/originals';
import { visibleSet } from './measurement-sets';

/** The set, if the caller may see all of it; what others uploaded of other programmes is as good as not there. */
async function wholeSet(caller: Caller, id: string, what: string): Promise<MeasurementSetRow> {
  const { set, isWhole } = await visibleSet(caller, id);
  if (isWhole) return set;
  throw new Fault(
    'not-found',
    `This set holds measurements of other programmes, so ${what} is not yours to see.`,
  );
}

export async function measurementFaults(
  caller: Caller,
  id: string,
  page: Page,
): Promise<List<MeasurementFault>> {
  const set = await wholeSet(caller, id, 'what was wrong with it');
  const { rows, next } = await listFaultRows(set.id, page);
  return { items: rows.map(({ seq: _, ...fault }) => fault), next };
}

/** Everything that is kept of the faults, for a table to download. */
export async function allMeasurementFaults(
  caller: Caller,
  id: string,
): Promise<{ readonly set: MeasurementSetRow; readonly faults: readonly MeasurementFault[] }> {
  const set = await wholeSet(caller, id, 'what was wrong with it');
  const { rows } = await listFaultRows(set.id, { limit: 1000 });
  return { set, faults: rows.map(({ seq: _, ...fault }) => fault) };
}

export async function measurementOriginal(
  caller: Caller,
  id: string,
): Promise<{ readonly set: MeasurementSetRow; readonly body: ReadableStream }> {
  const set = await wholeSet(caller, id, 'the original');
  return { set, body: await openOriginal(set.sha256) };
}

/** Frames of the set that the caller may see; null when those are all. */
async function ownFrames(
  caller: Caller,
  id: string,
): Promise<{ set: MeasurementSetRow; frames: readonly number[] | null }> {
  const { set, isWhole } = await visibleSet(caller, id);
  if (isWhole) return { set, frames: null };
  return { set, frames: (await setFrames(dataScope(caller), set.id)).map((frame) => frame.id) };
}

export async function measuredStars(
  caller: Caller,
  id: string,
  query: StarsQuery,
): Promise<List<MeasuredStar>> {
  const { set, frames } = await ownFrames(caller, id);
  const { rows, next } = await listStarRows({ ...query, setId: set.id, frames });
  return { items: rows.map(toStar), next };
}

const toStar = (row: MeasuredStarRow): MeasuredStar => ({
  number: row.starNo,
  name: row.name,
  ra: row.ra,
  dec: row.decl,
  rows: row.nRows,
  first_line: row.firstLine,
  standard:
    row.standard === null || row.v === null || row.bv === null
      ? null
      : { name: row.standard, field: row.field ?? '', V: row.v, BV: row.bv },
  matched_by: row.matchedBy,
  separation: row.separation,
  reason: row.reason,
});

export async function measurementRows(caller: Caller, id: string, page: Page): Promise<List<MeasurementRow>> {
  const { set } = await visibleSet(caller, id);
  const { rows, next } = await listMeasurementRowRows(dataScope(caller), set.id, page);
  const items = rows.map(({ rowNo, instMag, instErr, decl, ...row }) => ({
    ...row,
    row: rowNo,
    inst_mag: instMag,
    inst_err: instErr,
    dec: decl,
  }));
  return { items, next };
}

/** What matched and what did not, in numbers: for the head of a set's page. */
export async function measurementSummary(caller: Caller, id: string): Promise<MeasurementSummary> {
  const { set, frames } = await ownFrames(caller, id);
  const [seen, tally] = await Promise.all([setFrames(dataScope(caller), set.id), tallyStars(set.id, frames)]);
  return { frames: seen.map(({ number, band, nRows }) => ({ number, band, nRows })), tally };
}
