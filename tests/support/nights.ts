import type { SimulatedBand } from '@/lib/photometry/simulate';
import type { NightRecipe } from '@/lib/photometry/simulate-night';

const scatter = {
  drift: 0,
  extinctionDrift: 0,
  colourTerm2: 0,
  scatterObservation: 0.006,
  scatterFrame: 0.006,
};

/** Truth of an ordinary night in B and V. */
export const usualTruth: { readonly B: SimulatedBand; readonly V: SimulatedBand } = {
  B: { zeroPoint: 2.9, extinction: 0.25, colourTerm: 0.05, secondOrderExtinction: -0.03, ...scatter },
  V: { zeroPoint: 2.5, extinction: 0.14, colourTerm: -0.06, secondOrderExtinction: 0, ...scatter },
};

/** An ordinary night: five fields of five stars, 24 visits. */
export const nightRecipe = (seed: number, changes: Partial<NightRecipe> = {}): NightRecipe => ({
  seed,
  bands: usualTruth,
  nFields: 5,
  starsPerField: 5,
  nVisits: 24,
  airmass: { min: 1.02, max: 2.1 },
  length_hours: 8,
  starError: 0.004,
  nTargets: 3,
  nTargetFrames: 4,
  ...changes,
});
