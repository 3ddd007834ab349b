/**
 * The invented stars of the demo. Thistle 3 is an old open cluster: dwarfs on the published mean main sequence up to an
 * invented turn-off, an invented subgiant and giant branch above it, a quarter of the dwarfs binaries, all behind one
 * invented reddening. Field stars are drawn from a plain law: ten times as many two and a half magnitudes further down.
 */
import { radPerDeg } from '@/lib/astro/angles';
import { createRandom, type Random } from '@/lib/numerics/random';
import { readTable } from '../fixture-files';

export interface InventedStar {
  readonly name: string;
  readonly ra: number;
  readonly dec: number;
  readonly V: number;
  readonly BV: number;
  readonly UB: number;
  readonly VR: number;
  readonly VI: number;
  /** What it is in truth: a member, a binary member, a field star, a comparison star, the variable. */
  readonly kind: 'member' | 'binary' | 'giant' | 'field' | 'comparison' | 'variable';
}

interface Place {
  readonly ra: number;
  readonly dec: number;
}
interface Colours {
  readonly BV: number;
  readonly UB: number;
  readonly VR: number;
  readonly VI: number;
}
interface Sequence {
  /** Absolute magnitude and colours without reddening, along the main sequence from bright to faint. */
  readonly colourAt: (absolute: number) => Colours;
  readonly coloursOf: (BV: number) => Colours;
}

/** The invented truth of Thistle 3. */
export const thistle = {
  distanceModulus: 10.2,
  reddening: 0.11,
  turnOff: { absolute: 3.9, BV: 0.53 },
  faintest: 8.3,
  nDwarfs: 340,
  nGiants: 62,
  nField: 330,
  coreRadius: 0.065,
} as const;

/** Ratios of colour excesses to E(B−V), and of V extinction. Source: Cardelli, Clayton and Mathis 1989, for the shape; rounded. */
const excess = { BV: 1, UB: 0.72, VR: 0.6, VI: 1.25, V: 3.1 } as const;

/** Points of the invented evolution from the turn-off to the tip and of the clump: M_V and (B−V)₀. */
const branch: readonly (readonly [number, number])[] = [
  [3.9, 0.53],
  [3.45, 0.57],
  [3.2, 0.66],
  [3.15, 0.78],
  [3.1, 0.87],
  [2.6, 0.94],
  [1.8, 1.01],
  [0.9, 1.1],
  [0.1, 1.22],
  [-0.4, 1.32],
];
const clump = { absolute: 0.95, BV: 1.03, share: 0.22 } as const;

const round = (value: number, digits: number): number => Number(value.toFixed(digits));

/** Linear between the points of a table, which rises in its first column; held at its ends. */
function interpolate(table: readonly (readonly [number, number])[], at: number): number {
  const above = table.findIndex(([x]) => x >= at);
  const [x1, y1] = table[above === -1 ? table.length - 1 : above] ?? [0, 0];
  const [x0, y0] = table[Math.max(0, (above === -1 ? table.length : above) - 1)] ?? [x1, y1];
  return x1 === x0 || at >= x1 ? y1 : y0 + ((y1 - y0) * Math.max(0, at - x0)) / (x1 - x0);
}

/** The mean main sequence between A0 and M0, where its table has every colour. */
export async function readMainSequence(): Promise<Sequence> {
  type Column = 'M_V' | 'BV0' | 'UB0' | 'VRc' | 'VIc';
  const lines = (await readTable<Column>('tables/mean-main-sequence.csv')).filter(
    (line) =>
      Number(line.BV0) >= 0 &&
      Number(line.BV0) <= 1.4 &&
      line.UB0 !== '' &&
      line.VRc !== '' &&
      line.VIc !== '',
  );
  const against = (x: Column, y: Column) => lines.map((line) => [Number(line[x]), Number(line[y])] as const);
  const [byBrightness, ub, vr, vi] = [
    against('M_V', 'BV0'),
    against('BV0', 'UB0'),
    against('BV0', 'VRc'),
    against('BV0', 'VIc'),
  ];
  const coloursOf = (BV: number): Colours => ({
    BV,
    UB: interpolate(ub, BV),
    VR: interpolate(vr, BV),
    VI: interpolate(vi, BV),
  });
  return { coloursOf, colourAt: (absolute) => coloursOf(interpolate(byBrightness, absolute)) };
}

/** A place on the sky so many degrees east and north of a centre. */
function placed(centre: Place, east: number, north: number): Place {
  const dec = centre.dec + north;
  return { ra: round((centre.ra + east / Math.cos(dec * radPerDeg) + 360) % 360, 6), dec: round(dec, 6) };
}

/** Even over a square. */
const inSquare = (centre: Place, halfWidth: number, random: Random): Place =>
  placed(centre, (2 * random.uniform() - 1) * halfWidth, (2 * random.uniform() - 1) * halfWidth);

/** As a Plummer sphere appears in projection, out to the edge of the frame. */
function inCluster(centre: Place, halfWidth: number, random: Random): Place {
  for (;;) {
    const radius = thistle.coreRadius * Math.sqrt(1 / (1 - random.uniform()) - 1);
    const angle = 2 * Math.PI * random.uniform();
    const [east, north] = [radius * Math.sin(angle), radius * Math.cos(angle)];
    if (Math.abs(east) < halfWidth && Math.abs(north) < halfWidth) return placed(centre, east, north);
  }
}

function seen(absolute: number, colours: Colours): Omit<InventedStar, 'name' | 'ra' | 'dec' | 'kind'> {
  const { distanceModulus, reddening } = thistle;
  return {
    V: round(absolute + distanceModulus + excess.V * reddening, 3),
    BV: round(colours.BV + excess.BV * reddening, 3),
    UB: round(colours.UB + excess.UB * reddening, 3),
    VR: round(colours.VR + excess.VR * reddening, 3),
    VI: round(colours.VI + excess.VI * reddening, 3),
  };
}

/** Magnitudes of field stars: as many per magnitude as 10^(0.4 V), between two limits. */
function fieldStar(
  sequence: Sequence,
  limits: readonly [number, number],
  random: Random,
): Omit<InventedStar, 'name' | 'ra' | 'dec' | 'kind'> {
  const [bright, faint] = limits.map((V) => 10 ** (0.4 * V)) as [number, number];
  const V = 2.5 * Math.log10(bright + random.uniform() * (faint - bright));
  const isBlue = random.uniform() < 0.62;
  const BV = Math.min(
    1.38,
    Math.max(0.1, isBlue ? 0.68 + 0.14 * random.normal() : 1.12 + 0.17 * random.normal()),
  );
  const { UB, VR, VI } = sequence.coloursOf(BV);
  const own = (colour: number): number => round(colour + 0.02 * random.normal(), 3);
  return { V: round(V, 3), BV: round(BV, 3), UB: own(UB), VR: own(VR), VI: own(VI) };
}

/** Dwarfs fill the sequence from the turn-off down, more of them further down. */
function dwarf(
  sequence: Sequence,
  random: Random,
): { readonly star: ReturnType<typeof seen>; readonly kind: 'member' | 'binary' } {
  const { turnOff, faintest } = thistle;
  const absolute = turnOff.absolute + (faintest - turnOff.absolute) * random.uniform() ** 0.8;
  const single = sequence.colourAt(absolute);
  // Near the turn-off stars have left the mean sequence for the blue edge of the invented one.
  const blend = Math.exp(-((absolute - turnOff.absolute) / 0.5));
  const BV = single.BV * (1 - blend) + turnOff.BV * blend + 0.006 * random.normal();
  const isBinary = random.uniform() < 0.25;
  const brighter = isBinary ? 0.75 * Math.sqrt(random.uniform()) : 0;
  return { star: seen(absolute - brighter, sequence.coloursOf(BV)), kind: isBinary ? 'binary' : 'member' };
}

function giant(sequence: Sequence, random: Random): ReturnType<typeof seen> {
  const inClump = random.uniform() < clump.share;
  const tip = branch[branch.length - 1]?.[0] ?? 0;
  const absolute = inClump
    ? clump.absolute + 0.08 * random.normal()
    : thistle.turnOff.absolute + (tip - thistle.turnOff.absolute) * random.uniform() ** 1.6;
  const rising = branch
    .map(([magnitude, colour]) => [magnitude, colour] as const)
    .toSorted(([a], [b]) => a - b);
  const BV = (inClump ? clump.BV : interpolate(rising, absolute)) + 0.008 * random.normal();
  return seen(absolute, sequence.coloursOf(BV));
}

const numbered = (
  prefix: string,
  digits: number,
  stars: readonly Omit<InventedStar, 'name'>[],
): readonly InventedStar[] =>
  stars
    .toSorted((a, b) => a.V - b.V)
    .map((star, index) => ({ name: `${prefix}${String(index + 1).padStart(digits, '0')}`, ...star }));

/** Thistle 3 and the field before and behind it, brightest first. */
export function inventThistle(centre: Place, halfWidth: number, sequence: Sequence): readonly InventedStar[] {
  const random = createRandom(30_103, 0);
  const members = Array.from({ length: thistle.nDwarfs }, () => {
    const { star, kind } = dwarf(sequence, random);
    return { ...inCluster(centre, halfWidth, random), ...star, kind };
  });
  const giants = Array.from({ length: thistle.nGiants }, () => {
    return { ...inCluster(centre, halfWidth, random), ...giant(sequence, random), kind: 'giant' as const };
  });
  return numbered('T3-', 3, [
    ...members,
    ...giants,
    ...inventField(centre, halfWidth, sequence, { n: thistle.nField, limits: [11.5, 18.8], seed: 30_104 }),
  ]);
}

function inventField(
  centre: Place,
  halfWidth: number,
  sequence: Sequence,
  {
    n,
    limits,
    seed,
  }: { readonly n: number; readonly limits: readonly [number, number]; readonly seed: number },
): readonly Omit<InventedStar, 'name'>[] {
  const random = createRandom(seed, 0);
  return Array.from({ length: n }, () => ({
    ...inSquare(centre, halfWidth, random),
    ...fieldStar(sequence, limits, random),
    kind: 'field' as const,
  }));
}

/** Gorse 2: 2,000 stars. */
export function inventGorse(centre: Place, halfWidth: number, sequence: Sequence): readonly InventedStar[] {
  return numbered(
    'G2-',
    4,
    inventField(centre, halfWidth, sequence, { n: 2000, limits: [11, 19], seed: 21_700 }),
  );
}

/** LV Marrow at its mean magnitude, with eleven comparison stars. */
export function inventMarrow(centre: Place, halfWidth: number, sequence: Sequence): readonly InventedStar[] {
  const variable = {
    V: 12.93,
    BV: 0.31,
    ...{ UB: 0.05, VR: 0.2, VI: 0.42 },
    ...centre,
    kind: 'variable' as const,
  };
  const comparisons = inventField(centre, halfWidth, sequence, { n: 11, limits: [11.6, 14.6], seed: 11_411 });
  return [
    { name: 'LV Marrow', ...variable },
    ...numbered('LV Marrow C', 1, comparisons).map((star) => ({ ...star, kind: 'comparison' as const })),
  ];
}

/** What LV Marrow is fainter than its mean in a band, by an invented light curve of the kind of RR Lyrae stars [mag]. */
export function marrowVariation(utc: number, band: string): number {
  const period_ms = 0.5487 * 86_400_000;
  const maximum = Date.parse('2026-11-03T21:05:00Z');
  const amplitude = { U: 1.3, B: 1.25, V: 1, R: 0.8, I: 0.65 }[band] ?? 1;
  const phase = 2 * Math.PI * (((utc - maximum) / period_ms) % 1);
  // A sawtooth's first terms: a quick rise to the maximum, a slow decline.
  const terms = [0.36, 0.16, 0.07, 0.03];
  const curve = (angle: number): number =>
    terms.reduce((sum, size, index) => sum - size * Math.cos((index + 1) * angle - 0.25 * index), 0);
  return amplitude * curve(phase);
}
