import 'server-only';
import { radPerDeg } from '@/lib/astro/angles';
import type { ExposureSky } from '@/lib/astro/exposure-airmass';
import { starKey } from '@/lib/contracts/star-name';
import { bandPlace } from '@/lib/photometry/bands';
import { mergeStars, nameOfPosition } from '@/lib/photometry/merge-stars';
import { readTableFlag, type TableFlag } from '@/lib/photometry/table-flags';
import type { TargetMeasurements } from '@/lib/photometry/target-measurements';
import {
  flagTexts,
  measuredFrames,
  measurementChunks,
  starChunks,
  targetSets,
  type TargetSetRow,
} from '@/lib/server/data/target-tables';
import type { JobCaller } from '@/lib/server/policy/caller';
import type { TransformInputs, TargetFrame } from './transform-inputs';

/** What one programme measured in the night: columns, and its stars by name and place. */
export interface TargetColumns {
  readonly measurements: TargetMeasurements;
  /** One for each frame. */
  readonly skies: readonly (ExposureSky | null)[];
  readonly names: readonly string[];
  /** J2000, mean of the measurements [deg]; NaN without one. */
  readonly ra: Float64Array;
  readonly dec: Float64Array;
  /** Measurements that are not used: marked to be left out, measured anew in a later set, or on a frame without airmass. */
  readonly nLeftOut: number;
}

/**
 * Every measurement of the night's targets, as plain columns by programme. A star measured twice on one frame, in two
 * sets, counts as the later set has it. `onRows` is told after every chunk how many of how many rows were read.
 */
export async function targetColumns(
  _caller: JobCaller,
  inputs: TransformInputs,
  onRows: (rows: number, total: number) => void,
): Promise<ReadonlyMap<number | null, TargetColumns>> {
  const sets = await targetSets(inputs.nightId);
  const measured = await measuredFrames(sets.map(({ id }) => id));
  const tables = newTables(inputs, measured);
  const total = sets.reduce((sum, { nRows }) => sum + nRows, 0);
  let read = 0;
  for (const set of sets) {
    const known = await setStars(set);
    const flags = new Map<number, TableFlag>();
    for (const { flagNo, text } of await flagTexts(set.id)) flags.set(flagNo, readTableFlag(text));
    for (const table of tables.values()) table.beginSet(set);
    for await (const rows of measurementChunks(set.id)) {
      for (const row of rows) {
        const frame = tables.frameOf.get(row[1] as number);
        if (frame === undefined || (frame.isStandard && set.isMixed === 1)) continue;
        frame.table.take(row as MeasurementRow, frame.place, { known, flags });
      }
      read += rows.length;
      onRows(read, total);
    }
  }
  return new Map([...tables].map(([programmeId, table]) => [programmeId, table.columns()]));
}

/** row_no, frame_id, star_no, inst_mag, inst_err, ra, decl, peak, flag_no */
type MeasurementRow = readonly [
  number,
  number,
  number,
  number,
  number,
  number | null,
  number | null,
  number | null,
  number | null,
];

interface SetStars {
  readonly names: readonly string[];
  /** Where the table has no position a row; NaN without one [deg]. */
  readonly ra: Float64Array;
  readonly dec: Float64Array;
}

async function setStars({ id, lastStar }: TargetSetRow): Promise<SetStars> {
  const names = new Array<string>(lastStar + 1).fill('');
  const ra = new Float64Array(lastStar + 1).fill(NaN);
  const dec = ra.slice();
  for await (const rows of starChunks(id)) {
    for (const row of rows) {
      const star = row[0] as number;
      names[star] = row[1] as string;
      ra[star] = (row[2] as number | null) ?? NaN;
      dec[star] = (row[3] as number | null) ?? NaN;
    }
  }
  return { names, ra, dec };
}

interface SetContext {
  readonly known: SetStars;
  readonly flags: ReadonlyMap<number, TableFlag>;
}
interface Table {
  readonly beginSet: (set: TargetSetRow) => void;
  readonly take: (row: MeasurementRow, frame: number, set: SetContext) => void;
  readonly columns: () => TargetColumns;
}
interface FramePlace {
  readonly table: Table;
  readonly place: number;
  readonly isStandard: boolean;
}
interface Tables extends ReadonlyMap<number | null, Table> {
  readonly frameOf: ReadonlyMap<number, FramePlace>;
}

/** An empty table for each programme that waits for its magnitudes, as large as its measurements are many. */
function newTables(
  { transformations, frames, saturation }: TransformInputs,
  measured: Awaited<ReturnType<typeof measuredFrames>>,
): Tables {
  const counts = new Map(measured.map((frame) => [frame.frameId, frame]));
  const tables = new Map<number | null, Table>();
  const frameOf = new Map<number, FramePlace>();
  for (const { programmeId } of transformations) {
    const own = frames.filter((frame) => frame.programmeId === programmeId && counts.has(frame.id));
    const capacity = own.reduce((sum, { id }) => sum + Number(counts.get(id)?.nRows ?? 0), 0);
    const isShared = own.map(({ id }) => Number(counts.get(id)?.nSets ?? 0) > 1);
    const table = newTable(own, { capacity, isShared, saturation });
    tables.set(programmeId, table);
    own.forEach(({ id, isStandard }, place) => frameOf.set(id, { table, place, isStandard }));
  }
  return Object.assign(tables, { frameOf });
}

interface Size {
  readonly capacity: number;
  /** Frames on which more than one set has measurements. */
  readonly isShared: readonly boolean[];
  readonly saturation: number;
}

function newTable(frames: readonly TargetFrame[], { capacity, isShared, saturation }: Size): Table {
  const stars = newStars();
  const columns = {
    star: new Uint32Array(capacity),
    frame: new Uint32Array(capacity),
    instMag: new Float64Array(capacity),
    instErr: new Float64Array(capacity),
    saturated: new Uint8Array(capacity),
  };
  const isUsable = frames.map(({ band, airmass }) => band !== null && Number.isFinite(airmass));
  let n = 0;
  let nLeftOut = 0;

  function take(row: MeasurementRow, frame: number, { known, flags }: SetContext): void {
    const [, , starNo, instMag, instErr, ra, dec, peak, flagNo] = row;
    const flag = flagNo === null ? undefined : flags.get(flagNo);
    if (flag?.isLeftOut === true || isUsable[frame] !== true) {
      nLeftOut += 1;
      return;
    }
    columns.star[n] = stars.find(starNo, known, { ra, dec });
    columns.frame[n] = frame;
    columns.instMag[n] = instMag;
    columns.instErr[n] = instErr;
    columns.saturated[n] = flag?.isSaturated === true || (peak !== null && peak >= saturation) ? 1 : 0;
    n += 1;
  }

  function finish(): TargetColumns {
    const merged = mergeStars({ keys: stars.names.map(starKey), vectors: stars.vectors() });
    for (let m = 0; m < n; m += 1) columns.star[m] = merged.star[columns.star[m] ?? 0] ?? 0;
    const kept = withoutRepeats(columns, { n, isShared });
    const per = (value: (frame: TargetFrame) => number): Float64Array => Float64Array.from(frames, value);
    return {
      measurements: {
        star: columns.star.subarray(0, kept),
        frame: columns.frame.subarray(0, kept),
        instMag: columns.instMag.subarray(0, kept),
        instErr: columns.instErr.subarray(0, kept),
        saturated: columns.saturated.subarray(0, kept),
        nStars: merged.nStars,
        frameBand: Uint8Array.from(frames, ({ band }) => (band === null ? 0 : bandPlace[band])),
        frameAirmass: per(({ airmass }) => airmass),
        frameHours: per(({ hours }) => hours),
        frameBjd: per(({ bjd }) => bjd),
        frameOffset: per(() => NaN),
      },
      skies: frames.map(({ sky }) => sky),
      names: Array.from(merged.named, (at, star) => {
        const name = stars.names[at] ?? '';
        return name === '' ? nameOfPosition(merged.ra[star] ?? NaN, merged.dec[star] ?? NaN) : name;
      }),
      ra: merged.ra,
      dec: merged.dec,
      nLeftOut: nLeftOut + n - kept,
    };
  }
  return { beginSet: stars.beginSet, take, columns: finish };
}

interface Stars {
  readonly beginSet: (set: TargetSetRow) => void;
  /** Place of a set's star in the list, and its position added to those before. */
  readonly find: (
    starNo: number,
    known: SetStars,
    place: { readonly ra: number | null; readonly dec: number | null },
  ) => number;
  readonly names: string[];
  readonly vectors: () => Float64Array;
}

function newStars(): Stars {
  const names: string[] = [];
  let vectors = new Float64Array(3 * 1024);
  let places = new Int32Array(0);
  return {
    names,
    beginSet: ({ lastStar }) => (places = new Int32Array(lastStar + 1).fill(-1)),
    find: (starNo, known, { ra, dec }) => {
      let star = places[starNo] ?? -1;
      if (star < 0) {
        star = names.push(known.names[starNo] ?? '') - 1;
        places[starNo] = star;
        if (3 * star + 3 > vectors.length) {
          const larger = new Float64Array(vectors.length * 2);
          larger.set(vectors);
          vectors = larger;
        }
      }
      const ra_rad = (ra ?? known.ra[starNo] ?? NaN) * radPerDeg;
      const dec_rad = (dec ?? known.dec[starNo] ?? NaN) * radPerDeg;
      if (Number.isNaN(ra_rad) || Number.isNaN(dec_rad)) return star;
      const cosDec = Math.cos(dec_rad);
      vectors[3 * star] = (vectors[3 * star] ?? 0) + cosDec * Math.cos(ra_rad);
      vectors[3 * star + 1] = (vectors[3 * star + 1] ?? 0) + cosDec * Math.sin(ra_rad);
      vectors[3 * star + 2] = (vectors[3 * star + 2] ?? 0) + Math.sin(dec_rad);
      return star;
    },
    vectors: () => vectors.subarray(0, 3 * names.length),
  };
}

type Columns = Pick<TargetMeasurements, 'star' | 'frame' | 'instMag' | 'instErr' | 'saturated'>;

/** Of measurements of one star on one frame the last one stays: sets come oldest first. Returns how many are left. */
function withoutRepeats(
  columns: Columns,
  { n, isShared }: { readonly n: number; readonly isShared: readonly boolean[] },
): number {
  if (!isShared.includes(true)) return n;
  const last = new Map<number, number>();
  const keyOf = (m: number): number => (columns.star[m] ?? 0) * isShared.length + (columns.frame[m] ?? 0);
  for (let m = 0; m < n; m += 1) if (isShared[columns.frame[m] ?? 0] === true) last.set(keyOf(m), m);
  let kept = 0;
  for (let m = 0; m < n; m += 1) {
    if (isShared[columns.frame[m] ?? 0] === true && last.get(keyOf(m)) !== m) continue;
    for (const column of Object.values(columns)) column[kept] = column[m] ?? 0;
    kept += 1;
  }
  return kept;
}
