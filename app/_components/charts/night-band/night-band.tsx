'use client';

import { useEffect, useMemo, useRef, useState, type RefObject } from 'react';
import type { AddressStretch } from '@/app/_components/hooks/stretch-address';
import { useWidth } from '@/app/_components/hooks/use-width';
import { formatClock, formatMinutes } from '@/app/_components/ui/format-time';
import type { BandCondition, BandFrame } from './band-input';
import { bandLayout } from './band-layout';
import { BandLegend } from './band-legend';
import { BandStrip } from './band-strip';
import { BandTable } from './band-table';
import type { Mark } from './frame-marks';
import type { NightSky } from './night-sky';
import { xOf } from './time-scale';
import { useBandSelection } from './use-band-selection';

interface NightBandProps {
  readonly sky: NightSky;
  readonly frames: readonly BandFrame[];
  readonly conditions: readonly BandCondition[];
  /** ms; null in nights gone by. */
  readonly now: number | null;
  readonly selected: AddressStretch | null;
  readonly onSelect: (stretch: AddressStretch | null) => void;
}

/** Below this the strip keeps its width and scrolls, px. */
const least = 640;
/** Width until the browser has measured it, px. */
const guess = 1280;

function markWords({ frame }: Mark): string {
  const what = [frame.type, frame.object, frame.band].filter(Boolean).join(', ');
  return `Frame ${frame.number}: ${what}, ${formatClock(frame.utc)}`;
}

function stretchWords(stretch: AddressStretch, frames: readonly BandFrame[]): string {
  const count = frames.filter(({ utc }) => utc >= stretch.from && utc < stretch.to).length;
  return `${formatMinutes(stretch.from)} to ${formatMinutes(stretch.to)}, ${count} ${count === 1 ? 'frame' : 'frames'}`;
}

interface ReadoutProps {
  readonly near: Mark | null;
  readonly tapped: number | null;
  readonly selected: AddressStretch | null;
  readonly frames: readonly BandFrame[];
}

/** One line of what is under the pointer, what a tap waits for, and what is selected. */
function Readout({ near, tapped, selected, frames }: ReadoutProps) {
  return (
    <>
      {near === null ? null : <span className="text-ink">{markWords(near)}</span>}
      {tapped === null ? null : (
        <span className="text-ink">From {formatMinutes(tapped)}: tap where it ends</span>
      )}
      {selected === null ? (
        <span>
          <span className="pointer-coarse:hidden">Drag along the strip to select a stretch</span>
          <span className="hidden pointer-coarse:inline">Tap either end of a stretch to select it</span>
        </span>
      ) : (
        <span className="text-ink">Selected: {stretchWords(selected, frames)}.</span>
      )}
    </>
  );
}

/** A strip that scrolls begins where the night stands: at now, or at the last frame. Later the person's own scrolling counts. */
function useFirstScroll(box: RefObject<HTMLDivElement | null>, x: number | null, isMeasured: boolean): void {
  const isDone = useRef(false);
  useEffect(() => {
    const strip = box.current;
    if (strip === null || x === null || !isMeasured || isDone.current) return;
    isDone.current = true;
    if (strip.scrollWidth > strip.clientWidth) {
      strip.scrollTo({ left: Math.max(0, x - strip.clientWidth * 0.7) });
    }
  }, [box, x, isMeasured]);
}

/**
 * One night from sunset to sunrise: the sky's darkness, the Moon, the airmass of the fields taken, every frame, the cloud.
 * It is how one moves in time: a stretch selected here is what the page's tables and plots show.
 */
export function NightBand({ sky, frames, conditions, now, selected, onSelect }: NightBandProps) {
  const [ref, measured] = useWidth<HTMLDivElement>();
  const width = Math.max(least, measured ?? guess);
  const layout = useMemo(
    () => bandLayout({ sky, frames, conditions, width, now }),
    [sky, frames, conditions, width, now],
  );
  const last = frames.at(-1)?.utc ?? null;
  const present = now !== null && now >= sky.start && now <= sky.end ? now : null;
  const wanted = selected?.to ?? present ?? last ?? (sky.start + sky.end) / 2;
  const origin = Math.min(sky.end, Math.max(sky.start, wanted));
  const selection = useBandSelection({ scale: layout.scale, selected, select: onSelect, origin });
  const [near, setNear] = useState<Mark | null>(null);
  useFirstScroll(ref, layout.nowX ?? (last === null ? null : xOf(layout.scale, last)), measured !== null);

  const words = selected === null ? 'nothing selected' : `selected ${stretchWords(selected, frames)}`;

  return (
    <section
      aria-label="Night band"
      className="mb-4.5 overflow-hidden rounded-panel border border-rule bg-sheet"
    >
      <BandStrip
        layout={layout}
        box={ref}
        selection={selection}
        selected={selected}
        words={words}
        onNear={setNear}
      />
      <BandLegend layout={layout}>
        <Readout near={near} tapped={selection.tapped} selected={selected} frames={frames} />
        {selected === null ? null : (
          <button type="button" onClick={selection.clear} className="min-h-6 text-ink underline">
            Clear
          </button>
        )}
      </BandLegend>
      <details className="border-t border-rule text-small">
        <summary className="px-3.5 py-1.5 text-ink-2 underline">The night as a table</summary>
        <BandTable sky={sky} frames={frames} conditions={conditions} />
      </details>
    </section>
  );
}
