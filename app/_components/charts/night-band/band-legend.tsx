import type { ReactNode } from 'react';
import { BandMark } from '@/app/_components/ui/band-mark';
import { crossShape, tickShape, triangleShape } from '@/app/_components/ui/band-shape';
import type { BandLayout } from './band-layout';
import type { MarkShape } from './frame-marks';

function Sign({ d, filled = false }: { readonly d: string; readonly filled?: boolean }) {
  return (
    <svg viewBox="-1.6 -1.6 3.2 3.2" aria-hidden="true" className="inline-block size-3 align-[-1px]">
      <path
        d={d}
        strokeWidth="0.4"
        className={filled ? 'fill-current stroke-current' : 'fill-none stroke-current'}
      />
    </svg>
  );
}

const centre = { x: 0, y: 0, r: 1 };

/** What the marks mean, of those that are there; what is selected, and the mark under the pointer, at the end. */
export function BandLegend({
  layout,
  children,
}: {
  readonly layout: BandLayout;
  readonly children: ReactNode;
}) {
  const shapes = new Set<MarkShape>(layout.marks.map(({ shape }) => shape));
  const outside = [
    layout.earlier > 0 ? `${layout.earlier} earlier` : '',
    layout.later > 0 ? `${layout.later} later` : '',
  ].filter(Boolean);
  return (
    <div className="flex flex-wrap gap-x-4.5 gap-y-1 border-t border-rule px-3.5 py-1.5 text-small text-ink-2">
      {layout.curves.length > 0 ? <span>Curves: airmass of the fields taken (right scale)</span> : null}
      {layout.rows.map(({ name }) =>
        name === 'other' ? null : (
          <span key={name}>
            <BandMark band={name} /> {name}
          </span>
        ),
      )}
      {shapes.has('hollow') ? <span>hollow: target</span> : null}
      {shapes.has('focus') ? (
        <span>
          <Sign d={triangleShape(centre)} filled /> focus
        </span>
      ) : null}
      {shapes.has('test') ? (
        <span>
          <Sign d={crossShape(centre)} /> test
        </span>
      ) : null}
      {shapes.has('tick') ? (
        <span>
          <Sign d={tickShape(centre)} /> bias, dark, flat
        </span>
      ) : null}
      {layout.clouds.length > 0 ? <span>Cloud in eighths under the axis</span> : null}
      {outside.length > 0 ? <span>Frames in daylight, not on the strip: {outside.join(', ')}</span> : null}
      <span className="ml-auto flex flex-wrap items-baseline gap-x-3">{children}</span>
    </div>
  );
}
