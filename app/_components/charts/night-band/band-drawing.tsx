import { memo, useId } from 'react';
import { labelSize, type BandLayout } from './band-layout';
import { MarkPaths } from './mark-paths';
import type { LabelPlace } from './place-labels';

function Label({ place, inSky = false }: { readonly place: LabelPlace; readonly inSky?: boolean }) {
  return (
    <text
      x={place.x}
      y={place.y}
      textAnchor={place.anchor}
      fontSize={labelSize}
      className={inSky ? 'fill-sky-ink stroke-sky-night [paint-order:stroke]' : 'fill-ink-2'}
      strokeWidth={inSky ? 2.5 : undefined}
      strokeLinejoin="round"
    >
      {place.text}
    </text>
  );
}

function Sky({ layout }: { readonly layout: BandLayout }) {
  const { scale, top, bottom, divide } = layout;
  const id = useId();
  return (
    <>
      <defs>
        <linearGradient id={id}>
          {layout.stops.map(({ offset, colour }) => (
            <stop key={offset} offset={offset} style={{ stopColor: colour }} />
          ))}
        </linearGradient>
      </defs>
      <rect x={0} y={top} width={scale.width} height={bottom - top} fill={`url(#${id})`} />
      <line x1={0} x2={scale.width} y1={divide} y2={divide} className="stroke-sky-ink" strokeOpacity={0.3} />
      {layout.moonBars.map(({ x, width }) => (
        <rect key={x} x={x} y={top} width={width} height={4} className="fill-sky-ink" fillOpacity={0.75} />
      ))}
    </>
  );
}

function Axis({ layout }: { readonly layout: BandLayout }) {
  return layout.hours.map(({ x, text }) => (
    <g key={x}>
      <line x1={x} x2={x} y1={layout.bottom} y2={layout.bottom + 5} className="stroke-edge" />
      {text === null ? null : <Label place={{ x, y: layout.hoursY, anchor: 'middle', text }} />}
    </g>
  ));
}

/** What does not change while a stretch is being selected. */
export const BandDrawing = memo(function BandDrawing({ layout }: { readonly layout: BandLayout }) {
  const { nowX, top, bottom } = layout;
  return (
    <>
      <Sky layout={layout} />
      {layout.sunLabels.map((place) => (
        <Label key={place.text} place={place} />
      ))}
      {layout.curves.map(({ name, path }) => (
        <path
          key={name}
          d={path}
          className="fill-none stroke-sky-ink"
          strokeWidth={1.1}
          strokeOpacity={0.6}
        />
      ))}
      {layout.moonLabel === null ? null : <Label place={layout.moonLabel} inSky />}
      {layout.curveLabels.map((place) => (
        <Label key={place.text} place={place} inSky />
      ))}
      {layout.rows.length > 0 ? null : (
        <Label
          place={{
            x: layout.scale.width / 2,
            y: layout.divide + 18,
            anchor: 'middle',
            text: 'No frames yet',
          }}
          inSky
        />
      )}
      <MarkPaths marks={layout.marks} size={layout.scale.width < 800 ? 4 : 4.6} />
      {layout.clouds.map((place) => (
        <Label key={place.x} place={place} />
      ))}
      <Axis layout={layout} />
      {nowX === null ? null : (
        <line x1={nowX} x2={nowX} y1={top - 4} y2={bottom + 6} className="stroke-sky-ink" strokeWidth={2} />
      )}
      {layout.nowLabel === null ? null : (
        <g className="font-semibold">
          <Label place={layout.nowLabel} inSky />
        </g>
      )}
    </>
  );
});
