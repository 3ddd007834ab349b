import type { Band } from '@/lib/contracts/bands';

/** Corners of each band's shape about the origin, of like area; V's half width is 0.9. B is a circle. */
const corners: Readonly<Record<Exclude<Band, 'B'>, readonly (readonly [number, number])[]>> = {
  U: [
    [-1, -1.05],
    [1, -1.05],
    [-1, 1.05],
    [1, 1.05],
  ],
  V: [
    [-0.9, -0.9],
    [0.9, -0.9],
    [0.9, 0.9],
    [-0.9, 0.9],
  ],
  R: [
    [0, -1.25],
    [1.25, 0],
    [0, 1.25],
    [-1.25, 0],
  ],
  I: [
    [0, -1.15],
    [1.09, -0.36],
    [0.68, 0.93],
    [-0.68, 0.93],
    [-1.09, -0.36],
  ],
};
const triangle: readonly (readonly [number, number])[] = [
  [0, -1.2],
  [1.15, 0.85],
  [-1.15, 0.85],
];

export interface Spot {
  readonly x: number;
  readonly y: number;
  /** Half the size, px. */
  readonly r: number;
}

const short = (value: number) => String(Math.round(value * 100) / 100);

function polygon(points: readonly (readonly [number, number])[], { x, y, r }: Spot): string {
  return `M${points.map(([dx, dy]) => `${short(x + dx * r)} ${short(y + dy * r)}`).join('L')}Z`;
}

/** The outline of a band's shape: hourglass, circle, square, diamond, pentagon from U to I. */
export function bandShape(band: Band, spot: Spot): string {
  if (band !== 'B') return polygon(corners[band], spot);
  const r = short(spot.r);
  return `M${short(spot.x - spot.r)} ${short(spot.y)}a${r} ${r} 0 1 0 ${short(2 * spot.r)} 0a${r} ${r} 0 1 0 ${short(-2 * spot.r)} 0Z`;
}

/** Focus frames. */
export function triangleShape(spot: Spot): string {
  return polygon(triangle, spot);
}

/** Test frames. */
export function crossShape({ x, y, r }: Spot): string {
  return `M${short(x - r)} ${short(y - r)}L${short(x + r)} ${short(y + r)}M${short(x + r)} ${short(y - r)}L${short(x - r)} ${short(y + r)}`;
}

/** Bias, dark and flat frames. */
export function tickShape({ x, y, r }: Spot): string {
  return `M${short(x)} ${short(y - r)}V${short(y + r)}`;
}
