'use client';

import { useState, type PointerEvent } from 'react';
import { nearest, within, type Box } from './chart-geometry';
import { toggled, type Selection } from './observation-list';
import type { ResidualPlot } from './residual-points';

interface ChartPointer {
  readonly plot: ResidualPlot;
  readonly width: number;
  readonly selection: Selection;
  readonly onSelect: (selection: Selection) => void;
}

const asBox_px = 5;
const isBox = ({ x1, y1, x2, y2 }: Box) => Math.hypot(x2 - x1, y2 - y1) > asBox_px;

/** A click selects the mark it meets, a drag those in its box; with Shift or Ctrl beside what was selected before. */
export function useChartPointer({ plot, width, selection, onSelect }: ChartPointer) {
  const [box, setBox] = useState<Box | null>(null);
  const placeOf = (event: PointerEvent<SVGSVGElement>) => {
    const { left, top } = event.currentTarget.getBoundingClientRect();
    return { x: event.clientX - left, y: event.clientY - top };
  };
  const handlers = {
    onPointerDown: (event: PointerEvent<SVGSVGElement>) => {
      if (event.button !== 0) return;
      const { x, y } = placeOf(event);
      event.currentTarget.setPointerCapture(event.pointerId);
      setBox({ x1: x, y1: y, x2: x, y2: y });
    },
    onPointerMove: (event: PointerEvent<SVGSVGElement>) => {
      if (box === null) return;
      const { x, y } = placeOf(event);
      setBox({ ...box, x2: x, y2: y });
    },
    onPointerUp: (event: PointerEvent<SVGSVGElement>) => {
      if (box === null) return;
      setBox(null);
      const adds = event.shiftKey || event.ctrlKey || event.metaKey;
      if (isBox(box)) {
        onSelect(new Set([...(adds ? selection : []), ...within(plot, width, box)]));
        return;
      }
      const hit = nearest(plot, width, { x: box.x2, y: box.y2 });
      if (hit !== null) onSelect(adds ? toggled(selection, hit.id) : new Set([hit.id]));
      else if (!adds) onSelect(new Set());
    },
    // The browser took the touch for a scroll of the page.
    onPointerCancel: () => setBox(null),
  };
  return { box: box !== null && isBox(box) ? box : null, handlers };
}
