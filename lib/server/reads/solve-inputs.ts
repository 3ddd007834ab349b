import 'server-only';
import { createHash } from 'node:crypto';
import type { SolutionFinding } from '@/lib/contracts/api/solution';
import type { VerdictLimits } from '@/lib/photometry/night-evidence';
import type { Range } from '@/lib/photometry/night-solution';
import { bandPlace } from '@/lib/photometry/bands';
import { overrules, type StandardObservations } from '@/lib/photometry/standard-observations';
import { readSettings } from '@/lib/contracts/settings';
import { extinctionHistory } from '@/lib/server/data/extinction-history';
import { instrumentOf } from '@/lib/server/data/instruments';
import { observatory } from '@/lib/server/data/observatory';
import {
  framesOfSets,
  nightsOfSolution,
  publishedStars,
  readStandardRows,
  setsWithStandards,
  type PublishedStar,
  type SolveFrame,
  type SolveNight,
  type SolveSet,
  type StandardColumns,
} from '@/lib/server/data/solve-inputs';
import { exclusionsOf, type StoredExclusion } from '@/lib/server/data/solution-writes';
import { requireSolution, type SolutionRow } from '@/lib/server/data/solutions';
import { targetSpan } from '@/lib/server/data/transformations';
import type { JobCaller } from '@/lib/server/policy/caller';
import { dataScope } from '@/lib/server/policy/scope';
import { onlyLatest } from './only-latest';
import { standardAirmasses, type StandardAirmasses } from './standard-airmasses';

/** Which row of which set each observation is, shape (n) each: the fit knows nothing of it. */
export interface ObservationKeys {
  readonly setId: Uint32Array;
  readonly rowNo: Uint32Array;
  readonly frameId: Uint32Array;
  readonly standardId: Uint32Array;
}

export interface SolveInputs {
  readonly solution: SolutionRow;
  readonly nights: readonly (SolveNight & { readonly utcZero: Date | null })[];
  readonly sets: readonly SolveSet[];
  readonly standardsSource: string;
  readonly frameVersions: number;
  readonly observations: StandardObservations;
  readonly keys: ObservationKeys;
  readonly exclusions: readonly StoredExclusion[];
  /** SHA-256 over all that the fit is given of the observations. */
  readonly hash: string;
  /** What of the standards could not be given to it, and why. */
  readonly findings: readonly SolutionFinding[];
  readonly history: Awaited<ReturnType<typeof extinctionHistory>>;
  readonly limits: VerdictLimits;
  /** What the targets of its own night span; null without any, or without standards to count the hours from. */
  readonly targets: { readonly airmass: Range; readonly hours: Range } | null;
}

/** Everything that a night is solved with, as it is at this moment. */
export async function solveInputs(caller: JobCaller, id: string): Promise<SolveInputs> {
  const solution = await requireSolution(dataScope(caller), id);
  const nights = await nightsOfSolution(solution.id);
  const [sets, exclusions, instrument, house, history] = await Promise.all([
    setsWithStandards(nights.map((night) => night.id)),
    exclusionsOf([solution.id]),
    instrumentOf(solution),
    observatory(),
    extinctionHistory(solution.telescopeId, solution.nightId),
  ]);
  const frames = await framesOfSets(sets.map((set) => set.id));
  const all: StandardColumns = {
    setId: [],
    rowNo: [],
    frameId: [],
    standardId: [],
    instMag: [],
    instErr: [],
  };
  for (const set of sets) await readStandardRows(set.id, all);
  const { rows, findings: measuredAgain } = onlyLatest(all, sets);
  const bands = new Set<string | null>(solution.model.fit.bands.map(({ band }) => band));
  // A frame of a band that was not asked for is none of this solve's; one without a band might be.
  const asked = frames.filter(({ band }) => band === null || bands.has(band));
  const published = await publishedStars([...new Set(rows.standardId)]);
  const observed = { rows, frames: asked, stars: published };
  const airmasses = await standardAirmasses(solution.model.airmassFormula, instrument, observed);
  const order = inOrderOfTime(rows, asked, airmasses);
  const inOrder = new Set(order.map((row) => rows.standardId[row]));
  const stars = published.filter((star) => inOrder.has(star.id));
  const parts = { solution, nights, frames: asked, airmasses, rows, order, stars, exclusions };
  const { observations, keys, utcZero } = assemble(parts);
  const used = new Set(keys.frameId);
  return {
    solution,
    nights: nights.map((night, place) => ({ ...night, utcZero: utcZero[place] ?? null })),
    sets: sets.filter((set) => keys.setId.includes(set.id)),
    standardsSource: [...new Set(stars.map(({ citation }) => citation))].join('; '),
    frameVersions: frames.reduce((sum, { id: frame, version }) => sum + (used.has(frame) ? version : 0), 0),
    observations,
    keys,
    exclusions,
    hash: hashOf(observations),
    findings: [...measuredAgain, ...leftOut(parts)],
    history,
    limits: readSettings(house?.settings).verdict,
    targets: await targetRanges(solution.nightId, utcZero[0] ?? null),
  };
}

async function targetRanges(nightId: number, utcZero: Date | null): Promise<SolveInputs['targets']> {
  const span = await targetSpan(nightId);
  if (span === null || utcZero === null) return null;
  const hours = (utc: Date): number => (utc.getTime() - utcZero.getTime()) / hour_ms;
  return {
    airmass: { min: span.airmassMin, max: span.airmassMax },
    hours: { min: hours(span.utcFirst), max: hours(span.utcLast) },
  };
}

interface Parts {
  readonly nights: readonly SolveNight[];
  readonly frames: readonly SolveFrame[];
  readonly airmasses: StandardAirmasses;
  readonly rows: StandardColumns;
  /** Places in `rows` of the observations, in order of time. */
  readonly order: readonly number[];
  readonly stars: readonly PublishedStar[];
  readonly exclusions: readonly StoredExclusion[];
}

/** Places of the rows that have an airmass, in order of time; on one frame as they stand in the file. */
function inOrderOfTime(
  rows: StandardColumns,
  frames: readonly SolveFrame[],
  { airmass }: StandardAirmasses,
): readonly number[] {
  const ranks = new Map(frames.map(({ id }, rank) => [id, rank]));
  const rank = (row: number): number => ranks.get(rows.frameId[row] ?? 0) ?? -1;
  return rows.frameId
    .map((_, row) => row)
    .filter((row) => !Number.isNaN(airmass[row]))
    .sort((a, b) => rank(a) - rank(b) || a - b);
}

const hour_ms = 3_600_000;

interface Assembled {
  readonly observations: StandardObservations;
  readonly keys: ObservationKeys;
  readonly utcZero: readonly (Date | null)[];
}

/** The observations as plain columns. */
function assemble(parts: Parts): Assembled {
  const { nights, frames, airmasses, rows, order, stars, exclusions } = parts;
  const column = <Name extends keyof StandardColumns>(name: Name): readonly number[] =>
    order.map((row) => rows[name][row] ?? 0);
  const frameOf = new Map(frames.map((frame) => [frame.id, frame]));
  const observed = column('frameId').map((id) => requireFound(frameOf.get(id), 'frame'));
  const usedFrames = [...new Set(observed)];
  const nightPlace = placesOf(nights.map(({ id }) => id));
  const framePlace = placesOf(usedFrames.map(({ id }) => id));
  const starPlace = placesOf(stars.map(({ id }) => id));
  const decided = new Map(exclusions.map((row) => [`${row.setId}.${row.rowNo}`, row.isExcluded]));
  const night = Uint16Array.from(observed, ({ nightId }) => requireFound(nightPlace.get(nightId), 'night'));
  const utcZero = meanTimes(night, observed, nights.length);
  const keys: ObservationKeys = {
    setId: Uint32Array.from(column('setId')),
    rowNo: Uint32Array.from(column('rowNo')),
    frameId: Uint32Array.from(column('frameId')),
    standardId: Uint32Array.from(column('standardId')),
  };
  const overruleOf = (row: number): number => {
    const isExcluded = decided.get(`${keys.setId[row]}.${keys.rowNo[row]}`);
    return isExcluded === undefined ? overrules.none : isExcluded ? overrules.keepOut : overrules.keepIn;
  };
  const observations: StandardObservations = {
    night,
    star: Uint32Array.from(keys.standardId, (id) => requireFound(starPlace.get(id), 'standard')),
    frame: Uint32Array.from(keys.frameId, (id) => requireFound(framePlace.get(id), 'frame')),
    band: Uint8Array.from(observed, ({ band }) => bandPlace[requireFound(band ?? undefined, 'band')]),
    instMag: Float64Array.from(column('instMag')),
    instErr: Float64Array.from(column('instErr')),
    airmass: Float64Array.from(order, (row) => airmasses.airmass[row] ?? NaN),
    hours: Float64Array.from(
      observed,
      ({ utcMid }, row) => (utcMid.getTime() - (utcZero[night[row] ?? 0] ?? NaN)) / hour_ms,
    ),
    overrule: Uint8Array.from(order, (_, row) => overruleOf(row)),
    starNames: stars.map(({ name }) => name),
    frameNumbers: Uint32Array.from(usedFrames, ({ number }) => number),
    nightNames: nights.map(({ date }) => date),
    standards: starColumns(stars, ['v', 'bv', 'ub', 'vr', 'vi']),
    standardErrors: starColumns(stars, ['eV', 'eBv', 'eUb', 'eVr', 'eVi']),
  };
  return { observations, keys, utcZero: utcZero.map((time) => (time === null ? null : new Date(time))) };
}

function requireFound<T>(value: T | undefined, what: string): T {
  if (value === undefined) throw new Error(`An observation names a ${what} that was not read.`);
  return value;
}

const placesOf = (ids: readonly number[]): ReadonlyMap<number, number> =>
  new Map(ids.map((id, place) => [id, place]));

/** Mean time of each night's standards, to the millisecond that is stored; null without any. */
function meanTimes(
  night: Uint16Array,
  observed: readonly SolveFrame[],
  nNights: number,
): readonly (number | null)[] {
  const sums = Array.from({ length: nNights }, () => ({ first: NaN, later: 0, n: 0 }));
  for (const [row, { utcMid }] of observed.entries()) {
    const sum = sums[night[row] ?? 0];
    if (!sum) continue;
    if (sum.n === 0) sum.first = utcMid.getTime();
    sum.later += utcMid.getTime() - sum.first;
    sum.n += 1;
  }
  return sums.map(({ first, later, n }) => (n === 0 ? null : Math.round(first + later / n)));
}

type Figure = Exclude<keyof PublishedStar, 'id' | 'name' | 'citation'>;

function starColumns(
  stars: readonly PublishedStar[],
  [V, BV, UB, VR, VI]: readonly [Figure, Figure, Figure, Figure, Figure],
): StandardObservations['standards'] {
  const column = (name: Figure): Float64Array => Float64Array.from(stars, (star) => star[name] ?? NaN);
  return { V: column(V), BV: column(BV), UB: column(UB), VR: column(VR), VI: column(VI) };
}

type Column = Float64Array | Uint32Array | Uint16Array | Uint8Array;

/** Every array and name in a fixed order, each behind its own name: two different inputs cannot run together. */
function hashOf(observations: StandardObservations): string {
  const hash = createHash('sha256');
  const { standards, standardErrors, starNames, nightNames, ...columns } = observations;
  const named: Readonly<Record<string, object>> = { columns, standards, standardErrors };
  const arrays = Object.entries(named).flatMap(([part, values]) =>
    Object.entries(values as Readonly<Record<string, Column>>).map(
      ([name, column]) => [`${part}.${name}`, column] as const,
    ),
  );
  arrays.sort(([a], [b]) => (a < b ? -1 : 1));
  for (const [name, values] of arrays) {
    hash.update(`${name} ${values.length}\n`);
    hash.update(new Uint8Array(values.buffer, values.byteOffset, values.byteLength));
  }
  hash.update(JSON.stringify({ starNames, nightNames }));
  return hash.digest('hex');
}

const mostNamed = 8;

/** One finding a night and cause, for the frames whose standards the fit could not be given. */
function leftOut({ nights, frames, airmasses }: Parts): readonly SolutionFinding[] {
  const causes = new Map<string, { date: string; why: string; numbers: number[] }>();
  for (const frame of frames) {
    const why = airmasses.why.get(frame.id);
    if (why === undefined) continue;
    const date = nights.find(({ id }) => id === frame.nightId)?.date ?? '';
    const cause = causes.get(`${date} ${why}`) ?? { date, why, numbers: [] };
    cause.numbers.push(frame.number);
    causes.set(`${date} ${why}`, cause);
  }
  return [...causes.values()].map(({ date, why, numbers }) => {
    const named = numbers.slice(0, mostNamed).join(', ') + (numbers.length > mostNamed ? ' and others' : '');
    const frame = numbers.length === 1 ? `Frame ${named}` : `Each of the frames ${named}`;
    return {
      weight: 'caution',
      kind: 'missing-values',
      band: null,
      night_date: date,
      coefficient: null,
      reason: `${frame} ${why}, so standards on it were left out.`,
      remedy: 'Correct the frame in the log, or choose another airmass formula, and solve again.',
    };
  });
}
