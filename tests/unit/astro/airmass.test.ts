import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  airmass,
  airmassFormulas,
  airmassHardie1962,
  airmassKastenYoung1989,
  airmassPickering2002,
  airmassSecZ,
  airmassYoung1994,
} from '@/lib/astro/airmass';
import { apparentZenithDistance, refraction } from '@/lib/astro/refraction';
import { expectWithin } from '@/tests/support/numbers';
import { skyCases } from '@/tests/support/sky-oracle';
import reference from '@/tests/reference/airmass.json';

const seed = 20261104;
const tolerance = { absolute: 1e-5, unit: 'airmass' } as const;
const rows = reference.values;

describe('airmass against the published formulas', () => {
  it.each(rows)(
    'at $z_deg° each formula, given the zenith distance that it asks for, holds to 1e-5',
    (row) => {
      expectWithin(airmassYoung1994(row.z_deg), row.young1994, tolerance);
      expectWithin(airmassKastenYoung1989(row.z_deg), row.kasten_young1989, tolerance);
      expectWithin(airmassPickering2002(row.z_deg), row.pickering2002, tolerance);
      if (row.z_deg <= 85) expectWithin(airmassHardie1962(row.z_deg), row.hardie1962 ?? NaN, tolerance);
      if (row.z_deg < 90) expectWithin(airmassSecZ(row.z_deg), row.sec_z ?? NaN, tolerance);
    },
  );

  it.each(rows)(
    'at $z_deg° of true zenith distance refraction is added first where the formula asks for it',
    (row) => {
      expectWithin(refraction(90 - row.z_deg), row.refraction_deg_saemundsson_if_z_is_true, {
        absolute: 1e-6,
        unit: 'deg',
      });
      expectWithin(airmass('young1994', row.z_deg), row.young1994, tolerance);
      expectWithin(airmass('kastenYoung1989', row.z_deg), row.kasten_young1989_if_z_is_true, tolerance);
      expectWithin(airmass('pickering2002', row.z_deg), row.pickering2002_if_z_is_true, tolerance);
    },
  );

  it.each([0, 30, 60, 75, 84])(
    'Hardie and sec z at %d° of true zenith distance are taken at the apparent one',
    (z) => {
      const apparent = z - refraction(90 - z);
      expectWithin(airmass('hardie1962', z), airmassHardie1962(apparent), {
        absolute: 1e-12,
        unit: 'airmass',
      });
      expectWithin(airmass('secZ', z), airmassSecZ(apparent), { absolute: 1e-12, unit: 'airmass' });
    },
  );

  it.each(skyCases.filter((sky) => sky.airmass_young1994 !== null))(
    'case $id: Young 1994 at the altitude of the oracle is the airmass of the oracle',
    (sky) => {
      // The altitude is printed to 1e-6°; near the horizon that alone moves the sixth decimal.
      expectWithin(airmass('young1994', 90 - sky.alt_deg), sky.airmass_young1994 ?? NaN, tolerance);
    },
  );
});

describe('what every airmass does', () => {
  it.each(airmassFormulas)('%s is 1 at the zenith and grows all the way down', (formula) => {
    expectWithin(airmass(formula, 0), 1, { absolute: 3e-4, unit: 'airmass' });
    // From 0.2° on: the refraction's own zero near the zenith makes the first step flat.
    const down = Array.from({ length: 848 }, (_, i) => airmass(formula, (i + 2) / 10));
    const notGrowing = down.findIndex((value, i) => i > 0 && !(value > (down[i - 1] ?? NaN)));
    expect(notGrowing).toBe(-1);
  });

  it('the five agree within 0.4 % to 60°, and no two are the same formula', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 60, noNaN: true }), (z) => {
        for (const formula of airmassFormulas) {
          expectWithin(airmass(formula, z) / airmass('young1994', z), 1, { absolute: 0.004, unit: '' });
        }
      }),
      { seed },
    );
    expect(new Set(airmassFormulas.map((formula) => airmass(formula, 80).toFixed(4))).size).toBe(5);
  });

  it('at the horizon Young gives 31.7 and the others that can give 31 to 32 through the air', () => {
    expectWithin(airmass('young1994', 90), 31.735, { absolute: 0.001, unit: 'airmass' });
    expectWithin(airmass('kastenYoung1989', 90), 31.5, { absolute: 0.5, unit: 'airmass' });
    expectWithin(airmass('pickering2002', 90), 31.9, { absolute: 0.5, unit: 'airmass' });
  });
});

describe('what has no airmass is refused', () => {
  it.each(airmassFormulas)('%s below the horizon, with the altitude in the message', (formula) => {
    expect(() => airmass(formula, 90.01)).toThrow(/below the horizon.*altitude -0\.01/);
    expect(() => airmass(formula, 120)).toThrow(RangeError);
  });

  it.each(airmassFormulas)('%s at a zenith distance that is negative or not a number', (formula) => {
    expect(() => airmass(formula, -0.001)).toThrow(/Zenith distance/);
    expect(() => airmass(formula, NaN)).toThrow(/Zenith distance/);
    expect(() => airmass(formula, Infinity)).toThrow(/Zenith distance/);
  });

  it('each formula itself refuses what lies below the horizon', () => {
    for (const formula of [
      airmassYoung1994,
      airmassHardie1962,
      airmassKastenYoung1989,
      airmassPickering2002,
      airmassSecZ,
    ]) {
      expect(() => formula(90.5)).toThrow(/below the horizon/);
    }
  });

  it('Hardie beyond 85° of apparent zenith distance, and no sooner', () => {
    expect(airmassHardie1962(85)).toBeGreaterThan(10);
    expect(() => airmassHardie1962(85.01)).toThrow(/Hardie.*85/);
    expect(airmass('hardie1962', 85.1)).toBeGreaterThan(10);
    expect(() => airmass('hardie1962', 85.2)).toThrow(/Hardie/);
  });

  it('the secant at the horizon, where it is infinite', () => {
    expect(() => airmassSecZ(90)).toThrow(/infinite/);
  });
});

describe('refraction', () => {
  it('lifts by 29 arcmin at the horizon, by 1 arcmin at 45°, by nothing at the zenith', () => {
    expectWithin(refraction(0) * 60, 29, { absolute: 0.1, unit: 'arcmin' });
    expectWithin(refraction(45) * 60, 1, { absolute: 0.02, unit: 'arcmin' });
    expect(refraction(90)).toBe(0);
  });

  it('never lowers a star and never turns two stars over', () => {
    let above = apparentZenithDistance(0);
    for (let z = 0.1; z <= 92; z += 0.1) {
      const here = apparentZenithDistance(z);
      expect(here).toBeLessThanOrEqual(z);
      expect(here).toBeGreaterThan(above);
      above = here;
    }
  });

  it.each([-2.1, 90.1, NaN, Infinity])('has no value at altitude %d', (altitude) => {
    expect(() => refraction(altitude)).toThrow(/True altitude/);
  });

  it.each([-0.1, 92.1, NaN])('has no apparent zenith distance for %d', (z) => {
    expect(() => apparentZenithDistance(z)).toThrow(/True zenith distance/);
  });
});
