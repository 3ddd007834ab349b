import { createRandom } from '@/lib/numerics/random';
import { calibrationOf } from '@/lib/photometry/band-calibration';
import { usualBandModel, usualLimits, type FitModel } from '@/lib/photometry/fit-model';
import type { NightSolution } from '@/lib/photometry/night-solution';
import { simulateNight, type NightRecipe, type SimulatedNight } from '@/lib/photometry/simulate-night';
import { solveNights } from '@/lib/photometry/solve-nights';
import { transformTargets } from '@/lib/photometry/transform-targets';
import { nightRecipe, usualTruth } from '@/tests/support/nights';

/** Differences from the truth in stated standard errors, by what was measured. */
export type Pulls = ReadonlyMap<string, readonly number[]>;

export interface CampaignResult {
  readonly pulls: Pulls;
  /** Nights in which a band was not determined. */
  readonly undetermined: number;
  readonly nights: number;
}

/** A night as a good observatory has it. The prior on the second-order extinction of the usual model says ±0.01, so the
 * truth is drawn with that scatter: only then are pulls standard normal. */
export function usualNight(seed: number): NightRecipe {
  const random = createRandom(seed, 20);
  const { B, V } = usualTruth;
  return nightRecipe(seed, {
    bands: {
      B: {
        ...B,
        zeroPoint: B.zeroPoint + 0.05 * random.normal(),
        extinction: B.extinction + 0.02 * random.normal(),
        colourTerm: B.colourTerm + 0.01 * random.normal(),
        secondOrderExtinction: B.secondOrderExtinction + 0.01 * random.normal(),
      },
      V: {
        ...V,
        zeroPoint: V.zeroPoint + 0.05 * random.normal(),
        extinction: V.extinction + 0.02 * random.normal(),
        colourTerm: V.colourTerm + 0.01 * random.normal(),
      },
    },
  });
}

/** The same night with 10 % gross errors, a misidentified star and a cloudy visit. */
export function spoiltNight(seed: number): NightRecipe {
  const random = createRandom(seed, 21);
  const night = usualNight(seed);
  const { nFields, starsPerField, nVisits } = night;
  return {
    ...night,
    cloudyVisit: { visit: Math.floor(nVisits * random.uniform()), depth: 0.15 + 0.3 * random.uniform() },
    disturbances: {
      outliers: { fraction: 0.1, smallest: 0.1, largest: 0.8 },
      misidentified: [
        {
          star: Math.floor(nFields * starsPerField * random.uniform()),
          measured: {
            V: 10.4 + 2.8 * random.uniform(),
            BV: -0.2 + 1.8 * random.uniform(),
            UB: 0.2,
            VR: 0.4,
            VI: 0.8,
          },
        },
      ],
    },
  };
}

const model = (seed: number): FitModel => ({
  bands: [usualBandModel('B'), usualBandModel('V')],
  limits: usualLimits,
  seed,
});

/** Simulates, solves and transforms so many nights. */
export function runCampaign(
  nights: number,
  firstSeed: number,
  recipe: (seed: number) => NightRecipe,
): CampaignResult {
  const pulls = new Map<string, number[]>();
  const add = (name: string, pull: number): void => {
    const list = pulls.get(name);
    if (list === undefined) pulls.set(name, [pull]);
    else list.push(pull);
  };
  let undetermined = 0;
  for (let k = 0; k < nights; k += 1) {
    const night = simulateNight(recipe(firstSeed + k));
    const solution = solveNights(night.standards, model(firstSeed + k));
    if (solution.outcome === 'undetermined') {
      undetermined += 1;
      continue;
    }
    addCoefficients(add, night, solution);
    addTargets(add, night, solution);
  }
  return { pulls, undetermined, nights };
}

type Add = (name: string, pull: number) => void;

function addCoefficients(add: Add, night: SimulatedNight, solution: NightSolution): void {
  for (const { band, coefficients } of solution.bands) {
    const truth = night.truth.bands[band];
    for (const { name, term, value, error } of coefficients) {
      if (term.status === 'fixed' || truth === undefined || value === null || error === null) continue;
      add(`${band} ${name}`, (value - truth[name]) / error);
    }
  }
}

function addTargets(add: Add, { targets, truth }: SimulatedNight, solution: NightSolution): void {
  const calibrations = solution.bands.map(calibrationOf).filter((one) => one !== null);
  const { columns } = transformTargets(targets, calibrations, {
    assumedColour: null,
    lowSignal: 10,
    largeOffset: 0.1,
    nightWithCare: false,
  });
  for (const quantity of ['V', 'BV'] as const) {
    const { value, random, systematic } = columns[quantity];
    value.forEach((found, s) => {
      if (Number.isNaN(found)) return;
      const total = Math.hypot(random[s] ?? Number.NaN, systematic[s] ?? Number.NaN);
      add(
        quantity === 'V' ? 'target V' : 'target B−V',
        (found - (truth.targets[quantity][s] ?? Number.NaN)) / total,
      );
    });
  }
}
