import { describe, expect, it } from 'vitest';
import { usualBandModel, usualLimits, type FitModel } from '@/lib/photometry/fit-model';
import { type NightSolution } from '@/lib/photometry/night-solution';
import { solveNights } from '@/lib/photometry/solve-nights';
import { overrules } from '@/lib/photometry/standard-observations';
import { expectWithin } from '@/tests/support/numbers';
import { joinNights, standardNight, takeObservations } from '@/tests/support/standard-night';

const model: FitModel = { bands: [usualBandModel('V')], limits: usualLimits, seed: 11 };
const spoilt = standardNight({
  seed: 12,
  disturbances: { outliers: { fraction: 0.08, smallest: 0.1, largest: 0.8 } },
}).observations;
const solution = solveNights(spoilt, model);

const value = ({ bands }: NightSolution, name: string, night = 0): number =>
  bands.find((band) => band.night === night)?.coefficients.find((one) => one.name === name)?.value ??
  Number.NaN;
const error = ({ bands }: NightSolution, name: string, night = 0): number =>
  bands.find((band) => band.night === night)?.coefficients.find((one) => one.name === name)?.error ??
  Number.NaN;
const names = ['zeroPoint', 'extinction', 'colourTerm'] as const;

function expectSame(one: NightSolution, other: NightSolution, absolute = 1e-7): void {
  for (const name of names) {
    expectWithin(value(one, name), value(other, name), { absolute, unit: 'mag' });
    expectWithin(error(one, name), error(other, name), { absolute, unit: 'mag' });
  }
}

describe('a solution', () => {
  it('is the same each time, number by number', () => {
    expect(solveNights(spoilt, model)).toEqual(solution);
  });

  it('can be cloned between threads', () => {
    expect(structuredClone(solution)).toEqual(solution);
  });

  it('does not depend on the order of the observations', () => {
    const order = Array.from(spoilt.band, (_, o) => o).reverse();
    const reversed = solveNights(takeObservations(spoilt, order), model);
    expectSame(reversed, solution);
    expect(Array.from(reversed.observations.used)).toEqual([...solution.observations.used].reverse());
  });

  it('has a zero point that moves with the magnitudes, and nothing else that does', () => {
    const moved = solveNights({ ...spoilt, instMag: spoilt.instMag.map((m) => m + 1.5) }, model);
    expectWithin(value(moved, 'zeroPoint') - value(solution, 'zeroPoint'), 1.5, {
      absolute: 1e-7,
      unit: 'mag',
    });
    for (const name of ['extinction', 'colourTerm']) {
      expectWithin(value(moved, name), value(solution, name), { absolute: 1e-7, unit: 'mag' });
    }
  });

  it('has an extinction that shrinks as the unit of airmass grows', () => {
    const scaled = solveNights({ ...spoilt, airmass: spoilt.airmass.map((X) => 2 * X) }, model);
    expectWithin(2 * value(scaled, 'extinction'), value(solution, 'extinction'), {
      absolute: 1e-7,
      unit: 'mag',
    });
    expectWithin(2 * error(scaled, 'extinction'), error(solution, 'extinction'), {
      absolute: 1e-7,
      unit: 'mag',
    });
  });

  it('does not change when a rejected observation is left out', () => {
    const kept = Array.from(spoilt.band, (_, o) => o);
    const rejected = kept.find((o) => solution.observations.used[o] === 0) ?? Number.NaN;
    expect(rejected).toBeGreaterThanOrEqual(0);
    expectSame(
      solveNights(
        takeObservations(
          spoilt,
          kept.filter((o) => o !== rejected),
        ),
        model,
      ),
      solution,
    );
  });

  it('says how far from the fit a rejected observation lies, and how far it might', () => {
    expect(solution.observations.reasonWords[solution.observations.used.indexOf(0)]).toMatch(
      /^It is \d\.\d{3} mag (fainter|brighter) than the other observations predict, \d+\.\d standard errors from the fit; the limit is \d\.\d\.$/,
    );
  });

  it('uses what a person keeps in and leaves out what a person keeps out, and says both', () => {
    const rejected = solution.observations.used.indexOf(0);
    const used = solution.observations.used.indexOf(1);
    const overrule = spoilt.overrule.slice();
    overrule[rejected] = overrules.keepIn;
    overrule[used] = overrules.keepOut;
    const overruled = solveNights({ ...spoilt, overrule }, model);
    expect([overruled.observations.used[rejected], overruled.observations.used[used]]).toEqual([1, 0]);
    expect(overruled.observations.reasonWords[used]).toBe('A person keeps it out; the fit would use it.');
    const reasons = overruled.findings.filter(({ kind }) => kind === 'overruled').map(({ reason }) => reason);
    expect(reasons[0]).toContain(
      'In V a person keeps 1 observation out of the fit; the fit would use 1 of them',
    );
    expect(reasons[1]).toContain(
      'In V a person keeps 1 observation in the fit; the fit would reject 1 of them',
    );
  });
});

describe('nights solved jointly', () => {
  const good = standardNight({ seed: 21 });
  // By itself this night cannot tell the colour term.
  const oneColour = standardNight({ seed: 23, colour: [0.5, 0.7], truth: { V: { extinction: 0.18 } } });
  const nights = [
    good,
    standardNight({ seed: 22, truth: { V: { zeroPoint: 2.8, extinction: 0.22 } } }),
    oneColour,
  ];
  const joint = solveNights(joinNights(nights.map(({ observations }) => observations)), model);

  it('share the colour term and have zero points and extinctions of their own', () => {
    expect(joint.outcome).toBe('determined');
    expect(new Set([0, 1, 2].map((night) => value(joint, 'colourTerm', night))).size).toBe(1);
    for (const [night, { truth }] of nights.entries()) {
      for (const name of names) {
        const pull =
          (value(joint, name, night) - (truth.V?.[name] ?? Number.NaN)) / error(joint, name, night);
        expect(Math.abs(pull), `${name} of night ${night} has a pull of ${pull}`).toBeLessThan(4);
      }
    }
  });

  it('determine what one of them alone cannot', () => {
    const alone = solveNights(oneColour.observations, model);
    expect(alone.findings.map(({ kind }) => kind)).toContain('colour-range');
    expect(joint.bands[2]?.outcome).toBe('determined');
  });

  it('stand without a night that says nothing of its extinction', () => {
    const flat = standardNight({ seed: 24, airmass: [1.2, 1.3] });
    const solved = solveNights(joinNights([good.observations, flat.observations]), model);
    expect(solved.bands.map(({ outcome }) => outcome)).toEqual(['determined', 'undetermined']);
    expect(solved.findings.find(({ kind }) => kind === 'airmass-range')?.night).toBe(1);
  });

  it('as one night give what this night gives alone', () => {
    expectSame(solveNights(joinNights([spoilt]), model), solution);
  });
});
