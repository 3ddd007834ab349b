import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { separation } from '@/lib/astro/separation';
import { skyGrid } from '@/lib/astro/sky-grid';

function found(
  grid: ReturnType<typeof skyGrid>,
  ra: number,
  dec: number,
): readonly (readonly [number, number])[] {
  const all: [number, number][] = [];
  grid.within(ra, dec, (place, separation_arcsec) => all.push([place, separation_arcsec]));
  return all.sort((a, b) => a[0] - b[0]);
}

describe('skyGrid', () => {
  it('finds a place on the other side of right ascension 0', () => {
    const grid = skyGrid(2);
    grid.add(359.9999, 10);
    const [hit] = found(grid, 0.0001, 10);
    expect(hit?.[0]).toBe(0);
    expect(Math.abs((hit?.[1] ?? 0) - 0.72 * Math.cos((10 * Math.PI) / 180))).toBeLessThan(1e-6);
  });

  it('finds a place across a pole, where right ascensions mean little', () => {
    const grid = skyGrid(2);
    grid.add(10, 89.9999);
    grid.add(190, -89.9998);
    expect(found(grid, 190, 89.9999).map(([place, s]) => [place, Math.round(s * 1e6) / 1e6])).toEqual([
      [0, 0.72],
    ]);
    expect(found(grid, 10, -89.9999).map(([place, s]) => [place, Math.round(s * 1e6) / 1e6])).toEqual([
      [1, 1.08],
    ]);
    expect(found(grid, 77, 90).map(([place]) => place)).toEqual([0]);
  });

  it('counts a place exactly at the radius, and not one beyond it', () => {
    const grid = skyGrid(2);
    grid.add(100, 2 / 3600);
    grid.add(200, 2.0001 / 3600);
    expect(found(grid, 100, 0)).toHaveLength(1);
    expect(found(grid, 200, 0)).toHaveLength(0);
  });

  it('refuses a radius that is no radius', () => {
    for (const radius of [0, -1, NaN, 3601]) expect(() => skyGrid(radius)).toThrow(RangeError);
  });

  it('finds exactly what a search through all places finds, with the same separations', () => {
    // Whole numbers, because random doubles crowd around 0.
    const nearby = fc.integer({ min: -40_000, max: 40_000 }).map((step) => step * 1e-7);
    const centre = fc.constantFrom(
      [0, 0],
      [359.999, 60],
      [0.001, -89.999],
      [123, 89.9995],
      [180, 90],
      [90, -45],
    );
    const draw = fc.tuple(
      centre,
      fc.array(fc.tuple(nearby, nearby), { minLength: 120, maxLength: 160 }),
      nearby,
      nearby,
    );
    const place = (ra: number, dec: number) => ({
      ra: ((ra % 360) + 360) % 360,
      dec: Math.max(-90, Math.min(90, dec)),
    });
    fc.assert(
      fc.property(draw, fc.constantFrom(0.5, 2, 10), ([[ra = 0, dec = 0], offsets, dRa, dDec], radius) => {
        const grid = skyGrid(radius);
        const stretch = 1 / Math.max(0.01, Math.cos((dec * Math.PI) / 180));
        const places = offsets.map(([a, d]) => place(ra + a * stretch, dec + d));
        places.forEach((one) => grid.add(one.ra, one.dec));
        // Around every place too: whether a cell's edge lies between two places differs from one to the next. What
        // differs is gathered and asked for once: an assertion for each pair would take most of the time.
        const differing = [place(ra + dRa * stretch, dec + dDec), ...places].filter((around) => {
          const expected = places
            .map((one, index) => [index, separation(one, around) * 3600] as const)
            .filter(([, s]) => s <= radius);
          const hits = found(grid, around.ra, around.dec);
          const isSame = hits.every(([index, s], at) => {
            const [wanted, wantedS] = expected[at] ?? [NaN, NaN];
            return index === wanted && Math.abs(s - wantedS) < 1e-8;
          });
          return hits.length !== expected.length || !isSame;
        });
        expect(differing).toEqual([]);
      }),
      { numRuns: 60 },
    );
  });
});
