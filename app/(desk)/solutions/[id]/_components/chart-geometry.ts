import type { ResidualPlot, ResidualPoint } from './residual-points';

/** Where the axes leave room for the marks, px. */
export const chart = { height: 212, top: 8, right: 20, bottom: 2, yAxis: 46, xAxis: 38 } as const;

export interface Box {
  readonly x1: number;
  readonly y1: number;
  readonly x2: number;
  readonly y2: number;
}

export interface Place {
  readonly x: number;
  readonly y: number;
}

/** Places of a plot's points on a chart of a width, px. What is drawn over the marks reckons with the same figures. */
export function placer({ x, y }: Pick<ResidualPlot, 'x' | 'y'>, width: number) {
  const wide = width - chart.yAxis - chart.right;
  const high = chart.height - chart.top - chart.bottom - chart.xAxis;
  return (point: Pick<ResidualPoint, 'x' | 'y'>): Place => ({
    x: chart.yAxis + ((point.x - x.min) / (x.max - x.min)) * wide,
    y: chart.top + ((y.max - point.y) / (y.max - y.min)) * high,
  });
}

const reach = 12;

/** The point nearest to a place, as far as a finger is wide; null where there is none. */
export function nearest(plot: ResidualPlot, width: number, { x, y }: Place): ResidualPoint | null {
  const place = placer(plot, width);
  let [best, least]: [ResidualPoint | null, number] = [null, reach];
  for (const point of plot.points) {
    const at = place(point);
    const distance = Math.hypot(at.x - x, at.y - y);
    if (distance < least) [best, least] = [point, distance];
  }
  return best;
}

export function within(plot: ResidualPlot, width: number, { x1, y1, x2, y2 }: Box): readonly string[] {
  const place = placer(plot, width);
  return plot.points
    .filter((point) => {
      const { x, y } = place(point);
      return x >= Math.min(x1, x2) && x <= Math.max(x1, x2) && y >= Math.min(y1, y2) && y <= Math.max(y1, y2);
    })
    .map(({ id }) => id);
}
