'use client';

import { memo } from 'react';
import {
  CartesianGrid,
  ReferenceLine,
  Scatter,
  ScatterChart,
  XAxis,
  YAxis,
  type ScatterShapeProps,
} from 'recharts';
import { bandColour } from '@/app/_components/ui/band-mark';
import { bandShape, crossShape, type Spot } from '@/app/_components/ui/band-shape';
import { classNames } from '@/app/_components/ui/class-names';
import { formatSigned } from '@/lib/contracts/format-figure';
import { chart } from './chart-geometry';
import { tickWords, type ResidualPlot, type ResidualPoint } from './residual-points';

const size = 3.1;
const tick = { fill: 'var(--ink-2)', fontSize: 11 };

/** One observation: its band's shape, hollow and crossed where it is not used. */
function mark({ cx, cy, payload }: ScatterShapeProps) {
  const { band, isUsed, isBeyond, y } = payload as ResidualPoint;
  const spot = { x: cx ?? 0, y: cy ?? 0, r: size };
  const arrow = isBeyond ? arrowShape(spot, y > 0 ? -1 : 1) : '';
  if (isUsed) {
    return (
      <path
        d={`${bandShape(band, spot)}${arrow}`}
        fillOpacity="0.55"
        className={classNames(bandColour[band], 'dark-site:fill-transparent')}
      />
    );
  }
  return (
    <path
      d={`${bandShape(band, spot)}${crossShape({ ...spot, r: size + 1.6 })}${arrow}`}
      strokeWidth="1.2"
      data-rejected
      className={classNames(bandColour[band], 'fill-transparent')}
    />
  );
}

/** The way on to where the residual lies. */
const arrowShape = ({ x, y, r }: Spot, way: 1 | -1): string =>
  `M${x - r} ${y + way * (r + 1)}l${r} ${way * 3.5}l${r} ${-way * 3.5}`;

interface ResidualMarksProps {
  readonly plot: ResidualPlot;
  readonly title: string;
  readonly width: number;
}

/** Axes and marks of one chart. What is selected is drawn over it, so that selecting draws none of this again. */
export const ResidualMarks = memo(function ResidualMarks({ plot, title, width }: ResidualMarksProps) {
  const { x, y, points } = plot;
  return (
    <ScatterChart
      width={width}
      height={chart.height}
      margin={{ top: chart.top, right: chart.right, bottom: chart.bottom, left: 0 }}
      accessibilityLayer={false}
    >
      <CartesianGrid vertical={false} stroke="var(--rule)" />
      <XAxis
        type="number"
        dataKey="x"
        height={chart.xAxis}
        domain={[x.min, x.max]}
        ticks={[...x.ticks]}
        interval={width < 340 ? 'preserveStartEnd' : 0}
        tickFormatter={(value: number) => tickWords(plot, value)}
        tick={tick}
        tickLine={false}
        stroke="var(--rule)"
        label={{ value: title, position: 'insideBottom', offset: 2, fill: 'var(--ink)', fontSize: 11 }}
      />
      <YAxis
        type="number"
        dataKey="y"
        width={chart.yAxis}
        domain={[y.min, y.max]}
        ticks={[...y.ticks]}
        interval={0}
        tickFormatter={(value: number) => formatSigned(value, y.decimals)}
        tick={tick}
        tickLine={false}
        stroke="var(--rule)"
      />
      <ReferenceLine y={0} stroke="var(--rule-strong)" />
      <Scatter data={[...points]} isAnimationActive={false} shape={mark} />
    </ScatterChart>
  );
});
