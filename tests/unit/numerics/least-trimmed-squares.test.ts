import { describe, expect, it } from 'vitest';
import { fitTrimmed, type TrimmedFit, type TrimmedInput } from '@/lib/numerics/least-trimmed-squares';
import { createRandom } from '@/lib/numerics/random';
import { expectWithin } from '@/tests/support/numbers';

const seed = 20261201;

function fit(input: TrimmedInput): TrimmedFit {
  const outcome = fitTrimmed(input);
  if (outcome.kind === 'undetermined') throw new Error(JSON.stringify(outcome));
  return outcome;
}

/** A plane of unit scatter, of which a share lies far off and all on one side, where leverage is large. */
function spoilt(n: number, columns: number, share: number): TrimmedInput {
  const random = createRandom(seed, n + columns);
  const design = new Float64Array(n * columns).fill(1, 0, n);
  for (let at = n; at < design.length; at += 1) design[at] = 10 * random.uniform();
  const response = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    const off = i < share * n;
    if (off && columns > 1) design[n + i] = 30 + random.uniform();
    let y = random.normal();
    for (let j = 0; j < columns; j += 1) y += (j + 1) * (design[j * n + i] ?? NaN);
    response[i] = off ? 500 + 5 * random.normal() : y;
  }
  return { design, columns, response, anchored: null, subsets: 500, random: createRandom(seed, 9) };
}

describe('least trimmed squares', () => {
  it.each([
    [40, 2, 0.3],
    [200, 4, 0.4],
    [2000, 6, 0.3],
    [10_000, 10, 0.2],
  ])(
    '%d rows, %d columns: a share of %d that lies off together does not pull it',
    (n, columns, share) => {
      const found = fit(spoilt(n, columns, share));
      for (let j = 1; j < columns; j += 1)
        expectWithin(found.coefficients[j] ?? NaN, j + 1, { absolute: 4 / Math.sqrt(n), unit: '' });
      expect(found.scale).toBeGreaterThan(0.7);
      expect(found.scale).toBeLessThan(2.5);
    },
    30_000,
  );

  it('is the same for the same generator', () => {
    const input = spoilt(100, 3, 0.2);
    const again = (): TrimmedFit => fit({ ...input, random: createRandom(5) });
    expect(again()).toEqual(again());
  });

  it('an anchored row is never trimmed, and determines what the others do not', () => {
    const rows = 30;
    const random = createRandom(seed, 4);
    const input: TrimmedInput = {
      design: Float64Array.from({ length: 2 * (rows + 1) }, (_, at) =>
        at <= rows ? Number(at < rows) : Number(at === 2 * rows + 1),
      ),
      columns: 2,
      response: Float64Array.from({ length: rows + 1 }, (_, i) => (i === rows ? 7 : random.normal())),
      anchored: Uint8Array.from({ length: rows + 1 }, (_, i) => Number(i === rows)),
      subsets: 50,
      random,
    };
    const found = fit(input);
    expectWithin(found.coefficients[1] ?? NaN, 7, { absolute: 1e-12, unit: '' });
  });

  it('columns that cannot be told apart are named, wrong shapes refused', () => {
    const input = spoilt(20, 2, 0);
    expect(fitTrimmed({ ...input, design: new Float64Array(40).fill(1) })).toEqual({
      kind: 'undetermined',
      dependent: [[0, 1]],
    });
    expect(() => fitTrimmed({ ...input, columns: 3 })).toThrow(RangeError);
    expect(() => fitTrimmed({ ...input, response: new Float64Array(20).fill(NaN) })).toThrow(RangeError);
  });
});
