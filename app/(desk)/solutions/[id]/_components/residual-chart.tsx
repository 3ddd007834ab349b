'use client';

import { useMemo, useState, type KeyboardEvent } from 'react';
import { chart, placer, type Box } from './chart-geometry';
import { toggled, type Selection } from './observation-list';
import { ResidualMarks } from './residual-marks';
import type { ResidualPlot } from './residual-points';
import { useChartPointer } from './use-chart-pointer';

export interface ResidualChartProps {
  readonly plot: ResidualPlot;
  readonly title: string;
  readonly width: number;
  readonly selection: Selection;
  readonly onSelect: (selection: Selection) => void;
  /** An observation in words. */
  readonly words: (id: string) => string;
}

/** Steps of the keys that move along the x axis. */
const steps: Readonly<Record<string, number>> = {
  ArrowLeft: -1,
  ArrowRight: 1,
  PageUp: -10,
  PageDown: 10,
  Home: -Infinity,
  End: Infinity,
};

/** One chart of residuals. Arrows go from mark to mark along the axis, Space selects, Esc clears. */
export function ResidualChart({ plot, title, width, selection, onSelect, words }: ResidualChartProps) {
  const { box, handlers } = useChartPointer({ plot, width, selection, onSelect });
  const [cursor, setCursor] = useState<number | null>(null);
  const order = useMemo(() => plot.points.toSorted((one, other) => one.x - other.x), [plot]);
  const at = Math.min(cursor ?? 0, order.length - 1);
  const pointed = order[at];
  const onKeyDown = (event: KeyboardEvent) => {
    const step = steps[event.key];
    if (step !== undefined) {
      // The first of the arrows shows where one is.
      const from = cursor === null && Number.isFinite(step) ? 0 : at + step;
      setCursor(Math.min(order.length - 1, Math.max(0, from)));
    } else if (event.key === ' ' || event.key === 'Enter') {
      if (pointed !== undefined) onSelect(toggled(selection, pointed.id));
    } else if (event.key === 'Escape') onSelect(new Set());
    else return;
    event.preventDefault();
  };
  const isIn = pointed !== undefined && selection.has(pointed.id);
  return (
    <div className="relative" style={{ width, height: chart.height }}>
      <ResidualMarks plot={plot} title={title} width={width} />
      <svg
        width={width}
        height={chart.height}
        role="slider"
        tabIndex={order.length === 0 ? -1 : 0}
        aria-label={`Residuals against ${title}. The table of observations says the same in figures.`}
        aria-valuemin={1}
        aria-valuemax={Math.max(1, order.length)}
        aria-valuenow={at + 1}
        aria-valuetext={
          pointed === undefined ? 'no observation' : `${words(pointed.id)}${isIn ? ', selected' : ''}`
        }
        data-drag="span"
        onKeyDown={onKeyDown}
        onBlur={() => setCursor(null)}
        {...handlers}
        className="absolute inset-0 cursor-crosshair touch-pan-y"
      >
        <Rings plot={plot} width={width} selection={selection} />
        {cursor === null || pointed === undefined ? null : (
          <circle
            {...centre(plot, width, pointed)}
            r="10"
            strokeDasharray="3 2"
            className="fill-none stroke-ink stroke-1"
          />
        )}
        {box === null ? null : <SelectionBox box={box} />}
      </svg>
    </div>
  );
}

function centre(plot: ResidualPlot, width: number, point: { readonly x: number; readonly y: number }) {
  const { x, y } = placer(plot, width)(point);
  return { cx: x, cy: y };
}

function Rings({ plot, width, selection }: Pick<ResidualChartProps, 'plot' | 'width' | 'selection'>) {
  return plot.points
    .filter(({ id }) => selection.has(id))
    .map((point) => (
      <circle
        key={point.id}
        {...centre(plot, width, point)}
        r="7.5"
        data-ring
        className="fill-none stroke-accent stroke-2"
      />
    ));
}

function SelectionBox({ box: { x1, y1, x2, y2 } }: { readonly box: Box }) {
  return (
    <rect
      x={Math.min(x1, x2)}
      y={Math.min(y1, y2)}
      width={Math.abs(x2 - x1)}
      height={Math.abs(y2 - y1)}
      fillOpacity="0.4"
      strokeDasharray="4 3"
      className="fill-accent-wash stroke-accent"
    />
  );
}
