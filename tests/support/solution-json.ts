import type { SolutionInputs, SolutionModel } from '@/lib/contracts/solution-model';
import { SolveOptions } from '@/lib/contracts/solve-options';
import { usualBandModel, usualLimits } from '@/lib/photometry/fit-model';

const { exclusions: _, ...options } = SolveOptions.parse({});

/** What a solution that a test writes itself was asked: V, and all else as usual. */
export const usualModel: SolutionModel = {
  options,
  airmassFormula: 'young1994',
  fit: { bands: [usualBandModel('V')], limits: usualLimits, seed: 1 },
};

/** What such a solution was made from: no set. */
export const noInputs: SolutionInputs = {
  sets: [],
  standardsSource: 'Landolt 1992',
  equipmentEpoch: null,
  frameVersions: null,
};
