import { Matrix, QrDecomposition } from 'ml-matrix';
import { createRandom } from '@/lib/numerics/random';
import { usualBandModel, usualLimits, type FitModel } from '@/lib/photometry/fit-model';
import { simulateNight } from '@/lib/photometry/simulate-night';
import { solveNights } from '@/lib/photometry/solve-nights';
import type { StandardObservations } from '@/lib/photometry/standard-observations';
import type { BandCalibration, TargetMeasurements } from '@/lib/photometry/target-measurements';
import { transformTargets } from '@/lib/photometry/transform-targets';
import { nightRecipe, usualTruth } from '@/tests/support/nights';
import { calibration, usualOptions } from '@/tests/support/targets';
import type { Bench, Figure } from './bench';
import { joinNights } from './join-nights';

/** Solves and transformations, without database; each beside a plain piece of arithmetic on the same numbers. */
export const engine: Bench = {
  name: 'engine',
  run: () => Promise.resolve([...mixedSolves(), ...jointSolves(), ...transformations()]),
};

const model: FitModel = { bands: [usualBandModel('V')], limits: usualLimits, seed: 1 };

/** Processor time of a run. [s] */
function processorTime(work: () => unknown): number {
  const begun = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(begun);
  return (user + system) / 1e6;
}

/** Least processor time of three runs: what else the machine does only ever adds, and least to this clock. The works take
 * turns, so that a busy minute falls on all of them. [s] */
function shortestOfEach(works: readonly (() => unknown)[]): readonly number[] {
  const rounds = [1, 2, 3].map(() => works.map(processorTime));
  return works.map((_, k) => Math.min(...rounds.map((times) => times[k] ?? Number.NaN)));
}

const shortest = (work: () => unknown): number => shortestOfEach([work])[0] ?? Number.NaN;

/** A night in V of so many visits to five fields; 8 % of the stars are missed. */
const nightOf = (seed: number, nVisits: number, starsPerField: number): StandardObservations =>
  simulateNight(
    nightRecipe(seed, { bands: { V: usualTruth.V }, starSeed: 1, nVisits, starsPerField, nTargets: 0 }),
  ).standards;

function solve(observations: StandardObservations): void {
  const { outcome } = solveNights(observations, model);
  if (outcome !== 'determined') throw new Error('A simulated night was not determined.');
}

const told = (name: string, measured: number, baseline: number | null): Figure => ({
  name,
  measured,
  baseline,
  unit: 's',
  aim: null,
});

/** One weighted QR of zero point, extinction and colour term, nothing else. */
function plainQr({ star, standards, instMag, instErr, airmass }: StandardObservations): void {
  const colour = Array.from(star, (s) => standards.BV[s] ?? Number.NaN);
  const rows = colour.map((c, o) => {
    const w = 1 / (instErr[o] ?? Number.NaN);
    return [w, w * (airmass[o] ?? Number.NaN), w * c];
  });
  const response = Array.from(
    instMag,
    (mag, o) => (mag - (standards.V[star[o] ?? 0] ?? Number.NaN)) / (instErr[o] ?? Number.NaN),
  );
  new QrDecomposition(new Matrix(rows)).solve(Matrix.columnVector(response));
}

function mixedSolves(): readonly Figure[] {
  const nights = [nightOf(1, 50, 11), nightOf(2, 100, 22), nightOf(3, 200, 54)];
  const seconds = nights.map((night) => shortest(() => solve(night)));
  const [, middle = Number.NaN, large = Number.NaN] = seconds;
  const [, twoThousand, tenThousand] = nights;
  if (twoThousand === undefined || tenThousand === undefined) throw new Error('Three nights were made.');
  const growth = tenThousand.star.length / twoThousand.star.length;
  return [
    ...nights.map((night, k) =>
      told(
        `solve of one band, ${night.star.length} observations, against a plain QR of ml-matrix`,
        seconds[k] ?? Number.NaN,
        shortest(() => plainQr(night)),
      ),
    ),
    {
      name: `solve of ${twoThousand.star.length} observations alone`,
      measured: middle,
      baseline: null,
      unit: 's',
      aim: 1,
    },
    told(`growth to ${tenThousand.star.length} observations, against linear`, large, growth * middle),
  ];
}

/** Nights of the same standards in one fit, against the same nights alone and in fits of ten: nights differ in the rounds of
 * rejection that they need, so that other nights would be another measure. */
function jointSolves(): readonly Figure[] {
  const all = Array.from({ length: 200 }, (_, k) => nightOf(100 + k, 50, 11));
  return [50, 200].flatMap((count): Figure[] => {
    const nights = all.slice(0, count);
    const joint = joinNights(nights);
    const tens = Array.from({ length: count / 10 }, (_, k) => joinNights(nights.slice(10 * k, 10 * (k + 1))));
    const [together = Number.NaN, inTens = Number.NaN, alone = Number.NaN] = shortestOfEach([
      () => solve(joint),
      () => tens.forEach(solve),
      () => nights.forEach(solve),
    ]);
    return [
      told(`joint solve of ${count} nights of 500 observations, against these nights alone`, together, alone),
      {
        name: `joint solve of ${count} nights, against fits of ten of them`,
        measured: together,
        baseline: inTens,
        unit: 's',
        aim: 1.2,
      },
    ];
  });
}

const framesOfTargets = 40;

/** Every star on every frame, in the order of the frames, as tables come. */
function targetsOf(n: number): TargetMeasurements {
  const random = createRandom(5);
  const nStars = n / framesOfTargets;
  const perFrame = (of: (f: number) => number): Float64Array =>
    Float64Array.from({ length: framesOfTargets }, (_, f) => of(f));
  const columns = {
    star: new Uint32Array(n),
    frame: new Uint32Array(n),
    instMag: new Float64Array(n),
    instErr: new Float64Array(n),
  };
  for (let m = 0; m < n; m += 1) {
    columns.star[m] = m % nStars;
    columns.frame[m] = Math.floor(m / nStars);
    columns.instMag[m] = 14 + random.normal();
    columns.instErr[m] = 0.005 + 0.02 * random.uniform();
  }
  return {
    ...columns,
    saturated: new Uint8Array(n),
    nStars,
    frameBand: Uint8Array.from({ length: framesOfTargets }, (_, f) => 1 + (f % 2)),
    frameAirmass: perFrame((f) => 1 + f * 0.02),
    frameHours: perFrame((f) => f * 0.1 - 2),
    frameBjd: perFrame((f) => 2_461_000.5 + f * 0.004),
    frameOffset: perFrame(() => Number.NaN),
  };
}

const calibrations: readonly BandCalibration[] = (['B', 'V'] as const).map((band) =>
  calibration(band, usualTruth[band], {
    errors: { zeroPoint: 0.004, extinction: 0.003, colourTerm: 0.002 },
    scatterObservation: 0.006,
    scatterFrame: 0.006,
  }),
);

/** The weighted mean of each star's magnitudes, nothing corrected. */
function plainMeans({ star, instMag, instErr, nStars }: TargetMeasurements): Float64Array {
  const weights = new Float64Array(nStars);
  const sums = new Float64Array(nStars);
  for (let m = 0; m < star.length; m += 1) {
    const s = star[m] ?? 0;
    const w = 1 / (instErr[m] ?? Number.NaN) ** 2;
    weights[s] = (weights[s] ?? 0) + w;
    sums[s] = (sums[s] ?? 0) + w * (instMag[m] ?? Number.NaN);
  }
  return sums.map((sum, s) => sum / (weights[s] ?? Number.NaN));
}

function transformations(): readonly Figure[] {
  const counts = [100_000, 1_000_000, 4_000_000];
  const measured = counts.map((n) => {
    const targets = targetsOf(n);
    const seconds = shortest(() => transformTargets(targets, calibrations, usualOptions));
    return { n, seconds, plain: shortest(() => plainMeans(targets)) };
  });
  const [small, middle, large] = measured;
  if (small === undefined || middle === undefined || large === undefined)
    throw new Error('Three were measured.');
  return [
    ...measured.map(({ n, seconds, plain }) =>
      told(
        `transformation of ${n.toLocaleString('en-GB')} measurements, against plain means of stars`,
        seconds,
        plain,
      ),
    ),
    ...[
      [small, middle],
      [middle, large],
    ].map(([less = small, more = small]): Figure => ({
      name: `growth from ${less.n.toLocaleString('en-GB')} to ${more.n.toLocaleString('en-GB')}, against linear`,
      measured: more.seconds,
      baseline: (more.n / less.n) * less.seconds,
      unit: 's',
      aim: 1.3,
    })),
  ];
}
