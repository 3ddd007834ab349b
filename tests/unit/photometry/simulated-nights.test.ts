import { beforeAll, describe, expect, it } from 'vitest';
import { runCampaign, spoiltNight, usualNight, type CampaignResult } from '@/tests/simulations/campaign';
import { pullRows } from '@/tests/simulations/pull-table';
import { expectWithin } from '@/tests/support/numbers';

/**
 * The small sister of `npm run campaign`. With so few nights chance is larger than the errors that the campaign looks
 * for: of standard normal pulls the mean has a standard error of 1/√64 = 0.125, the standard deviation one of
 * 1.07/√128 = 0.095 (1.07 for the wider tails of 20 degrees of freedom). Limits are four of these, so that all 36
 * comparisons together are missed by chance once in 400 seeds; the stars of a night share errors and count as one.
 * The same nights spoilt are compared night by night, where the noise is the same: there the limit is the engine's own.
 */
const nights = 64;
const firstSeed = 7_000;
const chance = { mean: 4 * 0.125, smallestSd: 1 - 4 * 0.095, largestSd: 1 + 4 * 0.095 };
const quantities = [
  'B zeroPoint',
  'B extinction',
  'B colourTerm',
  'B secondOrderExtinction',
  'V zeroPoint',
  'V extinction',
  'V colourTerm',
  'target V',
  'target B−V',
];

describe('64 simulated nights', () => {
  let clean: CampaignResult;
  let spoilt: CampaignResult;
  beforeAll(() => {
    clean = runCampaign(nights, firstSeed, usualNight);
    spoilt = runCampaign(nights, firstSeed, spoiltNight);
  }, 120_000);

  it('are all determined, spoilt or not, and give pulls of every coefficient and of targets', () => {
    expect([clean.undetermined, spoilt.undetermined]).toEqual([0, 0]);
    expect([...clean.pulls.keys()]).toEqual(quantities);
    for (const name of quantities) expect(clean.pulls.get(name)?.length).toBeGreaterThanOrEqual(nights);
  });

  it.each(quantities)('%s has pulls of mean 0 and standard deviation 1 within chance', (name) => {
    const row = pullRows(clean, chance).find((one) => one.name === name);
    expect(row?.isMet, `mean ${row?.mean}, standard deviation ${row?.sd}`).toBe(true);
  });

  it.each(quantities)(
    '%s moves by less than 0.3 of its stated error in the mean when nights are spoilt, and its pulls stay standard',
    (name) => {
      const before = clean.pulls.get(name) ?? [];
      const after = spoilt.pulls.get(name) ?? [];
      const moved = after.reduce((sum, pull, k) => sum + pull - (before[k] ?? Number.NaN), 0) / after.length;
      expectWithin(moved, 0, { absolute: 0.3, unit: '(sigma)' });
      const row = pullRows(spoilt, chance).find((one) => one.name === name);
      expect(row?.sd).toBeLessThan(chance.largestSd);
    },
  );
});
