import { axisAbout, type Axis } from '@/app/_components/charts/axis-ticks';
import type { DiagramStar } from '@/lib/contracts/calibrated-page';

/** Room of the drawing beside the plot, px. Fixed, so that marks can be laid over it. */
export const room = { top: 10, right: 14, bottom: 40, left: 52 } as const;

export interface DiagramScale {
  /** B−V, left to right. */
  readonly x: Axis;
  /** V, bright up. */
  readonly y: Axis;
}

/** Axes about all the stars. */
export function diagramScale(stars: readonly DiagramStar[]): DiagramScale {
  const bounds = (of: (star: DiagramStar) => number) => {
    let [min, max] = [Infinity, -Infinity];
    for (const star of stars) [min, max] = [Math.min(min, of(star)), Math.max(max, of(star))];
    return stars.length === 0 ? ([0, 1] as const) : ([min, max] as const);
  };
  return { x: axisAbout(...bounds(({ BV }) => BV), 6), y: axisAbout(...bounds(({ V }) => V), 8) };
}

/** Where a star stands in a drawing of that size, px. */
export function placeOf(
  { x, y }: DiagramScale,
  size: { readonly width: number; readonly height: number },
  star: Pick<DiagramStar, 'V' | 'BV'>,
): { readonly x: number; readonly y: number } {
  const part = (axis: Axis, value: number) => (value - axis.min) / (axis.max - axis.min);
  return {
    x: room.left + part(x, star.BV) * (size.width - room.left - room.right),
    y: room.top + part(y, star.V) * (size.height - room.top - room.bottom),
  };
}
