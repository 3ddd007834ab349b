import { describe, expect, it } from 'vitest';
import { usualBandModel, usualLimits, type FitModel } from '@/lib/photometry/fit-model';
import { solveNights } from '@/lib/photometry/solve-nights';
import { weighEvidence, type EvidenceContext } from '@/lib/photometry/weigh-evidence';
import { standardNight, type NightPlan } from '@/tests/support/standard-night';

const model: FitModel = {
  bands: [usualBandModel('B'), usualBandModel('V')],
  limits: usualLimits,
  seed: 5,
};
const context: EvidenceContext = {
  night: 0,
  limits: { scatterV: 0.02, scatterB: 0.03, notPhotometric: 0.05, driftSigma: 3 },
  history: { V: { mean: 0.15, scatter: 0.02, n: 30 } },
  targets: { airmass: { min: 1.2, max: 2 }, hours: { min: -3, max: 3 } },
};
const bands = ['B', 'V'] as const;
const weighed = (plan: Partial<NightPlan>, change: Partial<EvidenceContext> = {}) =>
  weighEvidence(solveNights(standardNight({ bands, seed: 31, ...plan }).observations, model), {
    ...context,
    ...change,
  });
const scattered = (scatterObservation: number): Partial<NightPlan> => ({
  truth: { V: { scatterObservation } },
});

describe('weighEvidence', () => {
  it('calls a clean night photometric and says why in sentences', () => {
    const { items, suggested } = weighed({});
    expect(suggested).toBe('photometric');
    expect(items[0]?.words).toMatch(
      /^Scatter 0\.0\d\d mag in B and 0\.0\d\d in V: within 0\.03 and 0\.02\.$/u,
    );
    for (const { words } of items) expect(words).toMatch(/^[A-Z].*\.$/u);
  });

  it('says of all quiet bands in one sentence that they do not drift and that nothing is left out', () => {
    const { items } = weighed({});
    const said = (kind: string): readonly string[] =>
      items.filter((one) => one.kind === kind).map(({ words }) => words);
    expect(said('drift')).toEqual([
      expect.stringMatching(
        /^No significant drift: −?0\.\d{4} ± 0\.\d{4} mag per hour in B and −?0\.\d{4} ± 0\.\d{4} in V\.$/u,
      ),
    ]);
    expect(said('rejected')).toEqual(['All 192 observations in B and 192 in V are used.']);
  });

  it.each([
    ['usable with care', 'scatter', 0.035],
    ['not photometric', 'scatter', 0.08],
  ] as const)('suggests %s for its %s when V scatters by %d', (verdict, kind, scatter) => {
    const { items, suggested } = weighed(scattered(scatter));
    expect(suggested).toBe(verdict);
    expect(items.filter(({ speaks }) => speaks !== 'for').map((one) => one.kind)).toContain(kind);
  });

  it('judges U and B by the limit of B and the others by that of V', () => {
    const limits = { ...context.limits, scatterV: 0.0001 };
    const { items } = weighed({}, { limits });
    const judged = items.filter(({ kind }) => kind === 'scatter');
    expect(judged.map(({ speaks }) => speaks)).toEqual(['for', 'care']);
    expect(judged[1]?.band).toBe('V');
  });

  it('asks for care when the zero point drifts', () => {
    const { items, suggested } = weighed({ truth: { V: { drift: 0.015 } } });
    expect(suggested).toBe('usable with care');
    expect(items.find(({ kind, band }) => kind === 'drift' && band === 'V')?.speaks).toBe('care');
  });

  it('asks for care when the extinction is not like the site', () => {
    const { items } = weighed({}, { history: { V: { mean: 0.3, scatter: 0.02, n: 30 } } });
    const odd = items.find(({ kind }) => kind === 'extinction');
    expect(odd?.speaks).toBe('care');
    expect(odd?.words).toContain('below the site’s mean of 0.300 over 30 nights');
  });

  it('asks for care when targets lie outside the standards', () => {
    const targets = { airmass: { min: 1.2, max: 2.6 }, hours: { min: -3, max: 6 } };
    const found = weighed({}, { targets }).items.find(({ kind }) => kind === 'coverage');
    expect(found?.speaks).toBe('care');
    expect(found?.words).toContain('but targets are at airmass 1.20 to 2.60 and were taken up to');
  });

  it('speaks against a night without any determined band', () => {
    const { items, suggested } = weighed({ airmass: [1.2, 1.3] });
    expect(suggested).toBe('not photometric');
    expect(items.map(({ kind }) => kind)).toEqual(['undetermined']);
  });
});
