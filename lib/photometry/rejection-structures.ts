/**
 * Stars, frames and runs of frames that differ from the fit as a whole. A group is rejected when both hold:
 *
 * 1. Its shift z = â / s(â) in the mean-shift model (night-view.ts) is beyond what chance allows: the error of the star
 *    and the scatter of frames are in s(â), so that a shift of their size is none. The limit is that of a single
 *    observation or, if that is further out, of one false alarm in a hundred clean nights among all groups of its kind
 *    (Bonferroni's inequality), by Student's t for the degrees of freedom there are.
 * 2. Its rows agree with each other: at least four in five lie nearer to the shift than to the fit. A single gross
 *    error among good rows fails this, and is left to the test of single observations.
 *
 * A run is sought among all windows of three frames or more, in time, up to half of the night's frames: the window of
 * largest Σ a_f/v_f / √(Σ 1/v_f), a_f being the median residual of frame f and v_f its variance. So that a slow drift
 * is not taken for cloud, half of its frames must stand out by 2 standard errors each. The window is then tested as
 * above. The limit counts all windows, though they overlap: it is on the safe side.
 *
 * Frames at its edges that are rejected by themselves, to the same side, are added to it.
 *
 * Groups compete: the one of largest |z| is taken out first and the others are tested again without its rows.
 *
 * Sources: Cook and Weisberg 1982, Residuals and Influence in Regression, section 2.2 (mean-shift model and Bonferroni's
 * limit); search over windows: common practice, no source.
 */
import { median } from '@/lib/numerics/robust';
import { studentTLimit, studentTTail } from '@/lib/numerics/student-t';
import { columnValue } from './band-problem';
import { frameShifts, shiftOfGroup, shiftWithin, type NightView, type Shift } from './night-view';

export interface Structure extends Shift {
  readonly kind: 'star' | 'frame' | 'run';
  /** Place of the star; −1 for frames. */
  readonly star: number;
  /** Places of the frames, in time; empty for a star. */
  readonly frames: readonly number[];
  /** Rows of the problem that are rejected with it. */
  readonly rows: Int32Array;
  /** Limit of |shift| / error that it passed [1]. */
  readonly limit: number;
}

/** Expected number of false alarms of a kind in a clean night. Our own rule. */
const falseAlarms = 0.01;
/** Share of the rows of a group that must lie nearer to its shift than to the fit. Our own rule. */
const agreement = 0.8;
/** A group whose rows are used is looked at closely from here on. Our own rule [its standard errors]. */
const closerLook = 2.5;
const shortestRun = 3;
const mostRuns = 3;
/** What the frames of a run stand out by, in the middle [standard errors of a frame]. Our own rule. */
const standingOut = 2;

/** Two-sided probability beyond a number of normal standard deviations.
 * @param sigmas - number of standard deviations [1]
 * @returns probability [1]
 * @source definition */
export function normalTail(sigmas: number): number {
  return studentTTail(sigmas, Infinity);
}

export interface StructureLimits {
  readonly rejectSigmas: number;
  /** Degrees of freedom of the scatter of observations and of frames. */
  readonly dofObservation: number;
  readonly dofFrame: number;
}

/** Finds the structures of a night.
 * @param view - of the night
 * @param usable - rows of the night that may be rejected, used now or not, shape (m) [1]
 * @param limits - see there
 * @returns structures whose rows do not overlap
 * @accuracy at most about 1 false alarm of a kind in 100 clean nights
 * @source see the head */
export function findStructures(
  view: NightView,
  usable: Int32Array,
  limits: StructureLimits,
): readonly Structure[] {
  const taken = new Set<number>();
  const found: Structure[] = [];
  const accept = (structure: Structure): void => {
    found.push(structure);
    for (const row of structure.rows) taken.add(row);
  };
  for (let k = 0; k < mostRuns; k += 1) {
    const run = findRun(
      view,
      usable.filter((row) => !taken.has(row)),
      limits,
    );
    if (run === null) break;
    accept(run);
  }
  let candidates = groupsOf(view, usable, limits);
  for (;;) {
    const tested = candidates.flatMap((group) => {
      const rows = group.rows.filter((row) => !taken.has(row));
      const structure = rows.length < 2 ? null : testGroup(view, { ...group, rows });
      return structure === null ? [] : [{ group, structure }];
    });
    const ratio = ({ shift, error }: Shift): number => Math.abs(shift / error);
    const [worst] = tested.sort((a, b) => ratio(b.structure) - ratio(a.structure));
    if (worst === undefined) return joinRuns(view, usable, found);
    accept(worst.structure);
    candidates = tested.slice(1).map(({ group }) => group);
  }
}

/** Frames at the edge of a run that were rejected by themselves, to the same side, belong to it: a cloud thins out. */
function joinRuns(view: NightView, usable: Int32Array, found: readonly Structure[]): readonly Structure[] {
  const order = frameStates(view, usable).map(({ frame }) => frame);
  let structures = found;
  for (const run of found.filter(({ kind }) => kind === 'run')) {
    let grown = run;
    for (;;) {
      const edges = [order.indexOf(grown.frames[0]!) - 1, order.indexOf(grown.frames.at(-1)!) + 1];
      const neighbour = structures.find(
        ({ kind, frames, shift }) =>
          kind === 'frame' &&
          edges.includes(order.indexOf(frames[0]!)) &&
          Math.sign(shift) === Math.sign(grown.shift),
      );
      if (neighbour === undefined) break;
      const rows = Int32Array.from([...grown.rows, ...neighbour.rows]).sort();
      const frames = order.filter(
        (frame) => grown.frames.includes(frame) || neighbour.frames.includes(frame),
      );
      const joined: Structure = { ...grown, ...(shiftOfGroup(view, rows) ?? grown), frames, rows };
      structures = structures.flatMap((one) => (one === neighbour ? [] : [one === grown ? joined : one]));
      grown = joined;
    }
  }
  return structures;
}

type Group = Pick<Structure, 'kind' | 'star' | 'frames' | 'rows' | 'limit'>;

function testGroup(view: NightView, group: Group): Structure | null {
  const result = shiftOfGroup(view, group.rows);
  if (result === null) return null;
  const { shift, error, residuals } = result;
  if (!(Math.abs(shift) > group.limit * error)) return null;
  const agreeing = residuals.reduce((count, r) => count + (Math.abs(r - shift) < Math.abs(r) ? 1 : 0), 0);
  return agreeing < agreement * residuals.length ? null : { ...group, shift, error };
}

/** Stars and frames of at least two rows that deserve a closer look. */
function groupsOf(view: NightView, usable: Int32Array, limits: StructureLimits): Group[] {
  const { star, frame } = view.problem;
  const placeInView = new Map(Array.from(view.rows, (row, i) => [row, i] as const));
  const collect = (of: Int32Array): [number, number[]][] => {
    const groups = new Map<number, number[]>();
    for (const row of usable) {
      const known = groups.get(of[row]!);
      if (known === undefined) groups.set(of[row]!, [row]);
      else known.push(row);
    }
    return [...groups].filter(([, rows]) => rows.length > 1);
  };
  const inView = (rows: readonly number[]): number[] => rows.flatMap((row) => placeInView.get(row) ?? []);
  const shiftOfFrame = frameShifts(view);
  const suspicious =
    (shiftOf: (place: number, places: readonly number[]) => Shift) =>
    ([place, rows]: [number, number[]]): boolean => {
      const places = inView(rows);
      if (places.length < rows.length / 2) return true;
      const { shift, error } = shiftOf(place, places);
      return Math.abs(shift) > closerLook * error;
    };
  const limit = (count: number, dof: number): number =>
    studentTLimit(Math.min(normalTail(limits.rejectSigmas), falseAlarms / Math.max(1, count)), dof);
  const stars = collect(star);
  const frames = collect(frame);
  const starLimit = limit(stars.length, limits.dofObservation);
  const frameLimit = limit(frames.length, limits.dofFrame);
  return [
    ...stars.filter(suspicious((_, places) => shiftWithin(view, places))).map(([place, rows]): Group => ({
      kind: 'star',
      star: place,
      frames: [],
      rows: Int32Array.from(rows),
      limit: starLimit,
    })),
    ...frames.filter(suspicious((place) => shiftOfFrame.get(place)!)).map(([place, rows]): Group => ({
      kind: 'frame',
      star: -1,
      frames: [place],
      rows: Int32Array.from(rows),
      limit: frameLimit,
    })),
  ];
}

interface FrameState {
  readonly frame: number;
  readonly rows: readonly number[];
  readonly shift: number;
  readonly variance: number;
}

/** Frames of the night in time with the median of their residuals. */
function frameStates({ problem, components, coefficients }: NightView, usable: Int32Array): FrameState[] {
  const byFrame = new Map<number, number[]>();
  for (const row of usable) {
    const known = byFrame.get(problem.frame[row]!);
    if (known === undefined) byFrame.set(problem.frame[row]!, [row]);
    else known.push(row);
  }
  const residualOf = (row: number): number => {
    let rest = problem.response[row]!;
    for (const [j, { name }] of problem.sought.entries()) {
      const [X, C, t] = [problem.airmass[row]!, problem.colour[row]!, problem.hours[row]!];
      rest -= coefficients[j]! * columnValue(name, X, C, t);
    }
    return rest;
  };
  const states = [...byFrame].map(([frame, rows]): FrameState => {
    const precision = rows.reduce(
      (sum, row) =>
        sum +
        1 / (problem.sigma[row]! ** 2 + components.observation + problem.starSigma[problem.star[row]!]! ** 2),
      0,
    );
    return { frame, rows, shift: median(rows.map(residualOf)), variance: 1 / precision + components.block };
  });
  return states.sort((a, b) => problem.hours[a.rows[0]!]! - problem.hours[b.rows[0]!]!);
}

function findRun(view: NightView, usable: Int32Array, limits: StructureLimits): Structure | null {
  const states = frameStates(view, usable);
  const n = states.length;
  const longest = n >> 1;
  if (longest < shortestRun) return null;
  let windows = 0;
  let best = { from: 0, to: 0, deviate: 0 };
  for (let from = 0; from + shortestRun <= n; from += 1) {
    let [pull, weight] = [0, 0];
    for (let to = from; to < Math.min(n, from + longest); to += 1) {
      pull += states[to]!.shift / states[to]!.variance;
      weight += 1 / states[to]!.variance;
      if (to - from + 1 < shortestRun) continue;
      windows += 1;
      const deviate = Math.abs(pull) / Math.sqrt(weight);
      if (deviate > best.deviate) best = { from, to, deviate };
    }
  }
  const tail = Math.min(normalTail(limits.rejectSigmas), falseAlarms / windows);
  const limit = studentTLimit(tail, limits.dofFrame);
  if (!(best.deviate > limit)) return null;
  const inside = states.slice(best.from, best.to + 1);
  const sign = Math.sign(inside.reduce((sum, { shift, variance }) => sum + shift / variance, 0));
  const deviates = inside
    .map(({ shift, variance }) => (sign * shift) / Math.sqrt(variance))
    .sort((a, b) => a - b);
  if (deviates[deviates.length >> 1]! < standingOut) return null;
  return testGroup(view, {
    kind: 'run',
    star: -1,
    frames: inside.map(({ frame }) => frame),
    rows: Int32Array.from(inside.flatMap(({ rows }) => rows)).sort(),
    limit,
  });
}
