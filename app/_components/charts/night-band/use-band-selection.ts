'use client';

import { useState, type KeyboardEvent, type MouseEvent, type PointerEvent } from 'react';
import type { AddressStretch } from '@/app/_components/hooks/stretch-address';
import { minute_ms, toMinute, utcAt, type TimeScale } from './time-scale';

interface SelectionInput {
  readonly scale: TimeScale;
  readonly selected: AddressStretch | null;
  readonly select: (stretch: AddressStretch | null) => void;
  /** Where the keyboard's mark begins, ms. */
  readonly origin: number;
}

/** A movement of fewer px is a click or a tap. */
const slack = 5;
const step_ms = 5 * minute_ms;

/** Steps of the keyboard's mark, ms; null for keys that do not move it. */
function stepOf(event: KeyboardEvent): number | null {
  const steps: Readonly<Record<string, number>> = {
    ArrowLeft: -step_ms,
    ArrowRight: step_ms,
    ArrowDown: -step_ms,
    ArrowUp: step_ms,
    PageDown: -60 * minute_ms,
    PageUp: 60 * minute_ms,
    Home: -Infinity,
    End: Infinity,
  };
  return steps[event.key] ?? null;
}

function ordered(a: number, b: number): AddressStretch | null {
  const [from, to] = [toMinute(Math.min(a, b)), toMinute(Math.max(a, b))];
  return to > from ? { from, to } : null;
}

/**
 * Selecting a stretch: by dragging a mouse or pen; on a touch screen, where a drag scrolls, by a tap at either end; by
 * the keyboard with a mark that the arrows move, and select with while shift is down. Esc clears.
 */
export function useBandSelection({ scale, selected, select, origin }: SelectionInput) {
  const [drag, setDrag] = useState<{ readonly x: number; readonly from: number; readonly to: number } | null>(
    null,
  );
  const [tapped, setTapped] = useState<number | null>(null);
  const [mark, setMark] = useState<number | null>(null);
  const [anchor, setAnchor] = useState<number | null>(null);
  const at = (event: MouseEvent<SVGElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    return utcAt(scale, ((event.clientX - box.left) / box.width) * scale.width);
  };
  const clear = () => {
    setDrag(null);
    setTapped(null);
    setAnchor(null);
    select(null);
  };

  const onPointerDown = (event: PointerEvent<SVGElement>) => {
    if (event.button !== 0 || event.pointerType === 'touch') return;
    event.currentTarget.setPointerCapture(event.pointerId);
    setDrag({ x: event.clientX, from: at(event), to: at(event) });
  };
  const onPointerMove = (event: PointerEvent<SVGElement>) => {
    if (drag !== null) setDrag({ ...drag, to: at(event) });
  };
  const onPointerUp = (event: PointerEvent<SVGElement>) => {
    if (drag === null) return;
    setDrag(null);
    if (Math.abs(event.clientX - drag.x) < slack) return clear();
    select(ordered(drag.from, at(event)));
  };
  const onClick = (event: MouseEvent<SVGElement>) => {
    // A click by touch is the tap that no scrolling came of; mice have had their drag already.
    if (!(event.nativeEvent instanceof globalThis.PointerEvent)) return;
    if (event.nativeEvent.pointerType !== 'touch') return;
    if (tapped === null) {
      setTapped(at(event));
      return;
    }
    select(ordered(tapped, at(event)));
    setTapped(null);
  };

  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Escape') {
      if (selected === null && tapped === null && drag === null) return;
      event.preventDefault();
      return clear();
    }
    const step = stepOf(event);
    if (step === null) return;
    event.preventDefault();
    const present = mark ?? toMinute(origin);
    const moved = Math.min(scale.end, Math.max(scale.start, present + step));
    setMark(moved);
    if (!event.shiftKey) return setAnchor(null);
    const from = anchor ?? present;
    setAnchor(from);
    select(ordered(from, moved));
  };

  return {
    /** What is being dragged right now, before it is selected. */
    dragged: drag === null ? null : ordered(drag.from, drag.to),
    tapped,
    mark: mark ?? toMinute(origin),
    clear,
    pointer: {
      onPointerDown,
      onPointerMove,
      onPointerUp,
      onPointerCancel: () => setDrag(null),
      onClick,
    },
    onKeyDown,
  };
}

export type BandSelection = ReturnType<typeof useBandSelection>;
