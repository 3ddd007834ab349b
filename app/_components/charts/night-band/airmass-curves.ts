import type { FieldCurve, NightSky } from './night-sky';
import type { LabelPlace } from './place-labels';
import { type TimeScale, xOf } from './time-scale';

/** Airmass that the scale reaches down to; curves end there. */
export const lastAirmass = 2.6;
export const airmassTicks = [1, 1.5, 2, 2.5] as const;

/** Where curves are drawn, px. */
export interface CurveArea {
  readonly top: number;
  readonly bottom: number;
}

export function airmassY({ top, bottom }: CurveArea, airmass: number): number {
  return top + ((airmass - 1) / (lastAirmass - 1)) * (bottom - top);
}

interface Point {
  readonly x: number;
  readonly y: number;
}

function pointsOf(
  curve: FieldCurve,
  sky: NightSky,
  scale: TimeScale,
  area: CurveArea,
): readonly (Point | null)[] {
  return sky.utc.map((utc, i) => {
    const airmass = curve.airmass[i];
    if (airmass === null || airmass === undefined || airmass > lastAirmass) return null;
    return { x: xOf(scale, utc), y: airmassY(area, airmass) };
  });
}

const short = (value: number) => value.toFixed(1);

export interface DrawnCurve {
  readonly name: string;
  /** Empty when the field is nowhere above the scale's end. */
  readonly path: string;
  /** Places for its name, the best first. */
  readonly labels: readonly LabelPlace[];
}

/** A field's way as a line, and where its name may stand: by its highest point, then along the line to both sides. */
export function drawCurve(
  curve: FieldCurve,
  { sky, scale, area }: { readonly sky: NightSky; readonly scale: TimeScale; readonly area: CurveArea },
): DrawnCurve {
  const points = pointsOf(curve, sky, scale, area);
  let path = '';
  let isOn = false;
  for (const point of points) {
    if (point !== null) path += `${isOn ? 'L' : 'M'}${short(point.x)} ${short(point.y)}`;
    isOn = point !== null;
  }
  const drawn = points.filter((point) => point !== null);
  const apex = drawn.reduce((best, point, i) => (point.y < (drawn[best]?.y ?? Infinity) ? i : best), 0);
  const byDistance = drawn
    .map((point, i) => ({ point, away: Math.abs(i - apex) }))
    .sort((a, b) => a.away - b.away)
    .map(({ point }) => point);
  const above = byDistance.map(({ x, y }): LabelPlace => ({
    x,
    y: y - 4,
    anchor: 'middle',
    text: curve.name,
  }));
  const below = byDistance.map(({ x, y }): LabelPlace => ({
    x,
    y: y + 13,
    anchor: 'middle',
    text: curve.name,
  }));
  return { name: curve.name, path, labels: [...above, ...below] };
}
