'use client';

import { memo } from 'react';
import { CartesianGrid, Scatter, ScatterChart, XAxis, YAxis } from 'recharts';
import { useWidth } from '@/app/_components/hooks/use-width';
import { formatCount, formatFixed } from '@/lib/contracts/format-figure';
import type { DiagramStar } from '@/lib/contracts/calibrated-page';
import { diagramScale, placeOf, room } from './diagram-scale';

interface ColourMagnitudeProps {
  readonly stars: readonly DiagramStar[];
  /** How many there are; more than are drawn where they are too many. */
  readonly nStars: number;
  readonly selected: number | null;
  readonly onSelect: (no: number) => void;
}

const height = 460;
/** Until the room is measured, and where nothing is laid out. */
const usualWidth = 420;

/** V against B−V, bright up. The table beside it says the same in figures. */
export function ColourMagnitude({ stars, nStars, selected, onSelect }: ColourMagnitudeProps) {
  const [box, measured] = useWidth<HTMLDivElement>();
  const width = measured ?? usualWidth;
  const scale = diagramScale(stars);
  const chosen = stars.find(({ no }) => no === selected);
  const mark = chosen === undefined ? null : placeOf(scale, { width, height }, chosen);
  return (
    <figure>
      <div ref={box} className="relative overflow-hidden">
        <div
          role="img"
          aria-label={`Colour–magnitude diagram of ${formatCount(stars.length)} stars, V bright up against B−V. The table of stars says the same in figures.`}
        >
          <Plot stars={stars} width={width} onSelect={onSelect} />
        </div>
        {mark === null ? null : (
          <svg
            width={width}
            height={height}
            aria-hidden="true"
            className="pointer-events-none absolute inset-0"
          >
            <circle cx={mark.x} cy={mark.y} r="8" className="fill-none stroke-accent stroke-2" />
          </svg>
        )}
      </div>
      <figcaption className="mt-1 grid gap-1 text-small text-ink-2">
        <span aria-live="polite" className="min-h-4">
          {chosen === undefined
            ? 'Choose a point to find its row.'
            : `${chosen.star}: V ${formatFixed(chosen.V, 3)}, B−V ${formatFixed(chosen.BV, 3)}`}
        </span>
        <Legend />
        {nStars > stars.length ? (
          <span>
            An even choice of {formatCount(stars.length)} of {formatCount(nStars)} stars; narrow the list to
            see all of a part.
          </span>
        ) : null}
      </figcaption>
    </figure>
  );
}

interface PlotProps {
  readonly stars: readonly DiagramStar[];
  readonly width: number;
  readonly onSelect: (no: number) => void;
}

const tick = { fill: 'var(--ink-2)', fontSize: 11, fontFamily: 'inherit' } as const;
const line = 'var(--rule-strong)';

/** Drawn once: choosing a star moves the mark, not five thousand points. */
const Plot = memo(function Plot({ stars, width, onSelect }: PlotProps) {
  const { x, y } = diagramScale(stars);
  return (
    <ScatterChart
      width={width}
      height={height}
      margin={{ top: room.top, right: room.right, bottom: 0, left: 0 }}
      accessibilityLayer={false}
    >
      <CartesianGrid stroke="var(--rule)" />
      <XAxis
        type="number"
        dataKey="BV"
        height={room.bottom}
        domain={[x.min, x.max]}
        ticks={[...x.ticks]}
        interval={0}
        tickFormatter={(value: number) => formatFixed(value, x.decimals)}
        tick={tick}
        stroke={line}
        label={{ value: 'B−V, mag', position: 'insideBottom', offset: 4, ...tick }}
      />
      <YAxis
        type="number"
        dataKey="V"
        width={room.left}
        reversed
        domain={[y.min, y.max]}
        ticks={[...y.ticks]}
        interval={0}
        tickFormatter={(value: number) => formatFixed(value, y.decimals)}
        tick={tick}
        stroke={line}
        label={{ value: 'V, mag', angle: -90, position: 'insideLeft', offset: 12, ...tick }}
      />
      <Scatter
        data={[...stars]}
        isAnimationActive={false}
        shape={(dot: unknown) => <Dot {...(dot as DotProps)} onSelect={onSelect} />}
      />
    </ScatterChart>
  );
});

interface DotProps {
  readonly cx: number;
  readonly cy: number;
  readonly payload: DiagramStar;
}

function Dot({ cx, cy, payload, onSelect }: DotProps & { readonly onSelect: (no: number) => void }) {
  return (
    <circle
      cx={cx}
      cy={cy}
      r={payload.hasCautions ? 2.6 : 2.2}
      data-star={payload.no}
      onClick={() => onSelect(payload.no)}
      className={`cursor-pointer ${payload.hasCautions ? 'fill-sheet stroke-ink' : 'fill-ink stroke-transparent'}`}
      strokeWidth={payload.hasCautions ? 1 : 6}
    />
  );
}

function Legend() {
  return (
    <span className="flex flex-wrap gap-x-4">
      <span>
        <svg viewBox="0 0 8 8" aria-hidden="true" className="mr-1 inline-block size-2">
          <circle cx="4" cy="4" r="3" className="fill-ink" />
        </svg>
        without cautions
      </span>
      <span>
        <svg viewBox="0 0 8 8" aria-hidden="true" className="mr-1 inline-block size-2">
          <circle cx="4" cy="4" r="3" className="fill-sheet stroke-ink" />
        </svg>
        with cautions
      </span>
    </span>
  );
}
