import type { MouseEvent, RefObject } from 'react';
import type { AddressStretch } from '@/app/_components/hooks/stretch-address';
import { formatMinutes } from '@/app/_components/ui/format-time';
import { BandDrawing } from './band-drawing';
import { labelSize, type BandLayout } from './band-layout';
import { markNear, type Mark } from './frame-marks';
import { minute_ms, xOf } from './time-scale';
import type { BandSelection } from './use-band-selection';

/** Names of the rows at the left and the airmass scale at the right: they stay while the strip scrolls. */
function Gutter({ layout, side }: { readonly layout: BandLayout; readonly side: 'left' | 'right' }) {
  const isLeft = side === 'left';
  const text = (y: number, words: string) => (
    <text key={words} x={isLeft ? 8 : 7} y={y + 4} fontSize={labelSize} className="fill-ink-2">
      {words}
    </text>
  );
  return (
    <svg aria-hidden="true" width={isLeft ? 48 : 34} height={layout.height} className="shrink-0 bg-sheet">
      {isLeft ? (
        <>
          {layout.rows.map(({ name, y }) => text(y, name))}
          {layout.clouds.length > 0 ? text(layout.cloudY - 4, 'cloud') : null}
          {text(layout.hoursY - 4, 'UTC')}
        </>
      ) : layout.curves.length > 0 ? (
        layout.airmass.map(({ y, text: words }) => text(y, words))
      ) : null}
    </svg>
  );
}

function Stretch({ layout, stretch }: { readonly layout: BandLayout; readonly stretch: AddressStretch }) {
  const left = Math.max(0, xOf(layout.scale, stretch.from));
  const right = Math.min(layout.scale.width, xOf(layout.scale, stretch.to));
  if (right <= left) return null;
  return (
    <rect
      x={left}
      y={layout.top + 1}
      width={right - left}
      height={layout.bottom - layout.top - 2}
      className="fill-sky-ink stroke-sky-ink"
      fillOpacity={0.1}
      strokeWidth={1.5}
      strokeDasharray="4 3"
    />
  );
}

function Upright({ layout, utc }: { readonly layout: BandLayout; readonly utc: number }) {
  const x = xOf(layout.scale, utc);
  return (
    <line
      x1={x}
      x2={x}
      y1={layout.top}
      y2={layout.bottom}
      className="stroke-sky-ink"
      strokeWidth={1.5}
      strokeDasharray="4 3"
    />
  );
}

interface BandStripProps {
  readonly layout: BandLayout;
  readonly box: RefObject<HTMLDivElement | null>;
  readonly selection: BandSelection;
  readonly selected: AddressStretch | null;
  /** What is selected, in words. */
  readonly words: string;
  /** The pointer is by a mark, or left it. */
  readonly onNear: (mark: Mark | null) => void;
}

/** The strip itself: a control over the time of the night, moved by keys, dragged by a mouse, tapped by a finger. */
export function BandStrip({ layout, box, selection, selected, words, onNear }: BandStripProps) {
  const { scale, height, bottom } = layout;
  const look = (event: MouseEvent<SVGElement>) => {
    const frame = event.currentTarget.getBoundingClientRect();
    onNear(markNear(layout.marks, { x: event.clientX - frame.left, y: event.clientY - frame.top }, 9));
  };
  const shown = selection.dragged ?? selected;
  return (
    <div className="flex">
      <Gutter layout={layout} side="left" />
      <div
        ref={box}
        role="slider"
        tabIndex={0}
        aria-label="Time in the night. Arrow keys move, with shift they select, Esc clears."
        aria-valuemin={Math.round(scale.start / minute_ms)}
        aria-valuemax={Math.round(scale.end / minute_ms)}
        aria-valuenow={Math.round(selection.mark / minute_ms)}
        aria-valuetext={`${formatMinutes(selection.mark)} UTC, ${words}`}
        onKeyDown={selection.onKeyDown}
        data-drag="span"
        className="group min-w-0 flex-1 overflow-x-auto focus-visible:-outline-offset-2"
      >
        <svg
          width={scale.width}
          height={height}
          viewBox={`0 0 ${scale.width} ${height}`}
          aria-hidden="true"
          className="block touch-pan-x touch-pan-y select-none"
          {...selection.pointer}
          onMouseMove={look}
          onMouseLeave={() => onNear(null)}
        >
          <BandDrawing layout={layout} />
          {shown === null ? null : <Stretch layout={layout} stretch={shown} />}
          {selection.tapped === null ? null : <Upright layout={layout} utc={selection.tapped} />}
          <path
            d={`M${xOf(scale, selection.mark) - 5} ${bottom + 8}h10l-5 -7Z`}
            className="fill-accent opacity-0 group-focus-visible:opacity-100"
          />
        </svg>
      </div>
      <Gutter layout={layout} side="right" />
    </div>
  );
}
