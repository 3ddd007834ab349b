import { memo } from 'react';
import type { FieldStar } from './field-star';

interface SkyChartProps {
  readonly stars: readonly FieldStar[];
  readonly active: number;
  readonly onPoint: (index: number) => void;
  readonly onPick: (index: number) => void;
}

/** Side of the drawing; it is scaled to the room there is. */
const side = 440;
const margin = 26;
const smallestHalf = 0.06;
/** With more stars their names would cover each other: then only the star pointed at has its name. */
const mostNames = 10;

interface Scale {
  readonly x: (star: FieldStar) => number;
  readonly y: (star: FieldStar) => number;
  readonly px_perDeg: number;
}

function scaleOf(stars: readonly FieldStar[]): Scale {
  const [middleEast, middleNorth] = [
    middleOf(stars.map(({ east }) => east)),
    middleOf(stars.map(({ north }) => north)),
  ];
  const half = Math.max(
    smallestHalf,
    ...stars.map(({ east, north }) => Math.max(Math.abs(east - middleEast), Math.abs(north - middleNorth))),
  );
  const px_perDeg = (side / 2 - margin) / half;
  return {
    x: ({ east }) => side / 2 - (east - middleEast) * px_perDeg,
    y: ({ north }) => side / 2 - (north - middleNorth) * px_perDeg,
    px_perDeg,
  };
}

const middleOf = (values: readonly number[]): number => (Math.min(...values) + Math.max(...values)) / 2;

/** Bright stars are large dots: 1.7 px at V = 16.5, a little less than one more for each magnitude. */
const radiusOf = (v: number): number => Math.min(9, Math.max(1.7, 1.7 + 0.9 * (16.5 - v)));

/** The stars of a field as the sky shows them. The table beside it says the same for those who cannot see it. */
export function SkyChart({ stars, active, onPoint, onPick }: SkyChartProps) {
  const scale = scaleOf(stars);
  const star = stars[active];
  return (
    <figure>
      <svg
        viewBox={`0 0 ${side} ${side}`}
        role="img"
        aria-label={`Chart of ${stars.length} standard stars, north up, east left. The table of stars says the same in figures.`}
        className="block w-full bg-ground"
      >
        <rect x="0.5" y="0.5" width={side - 1} height={side - 1} className="fill-none stroke-rule" />
        <Compass />
        <ScaleBar px_perDeg={scale.px_perDeg} />
        <Stars stars={stars} scale={scale} onPoint={onPoint} onPick={onPick} />
        {star === undefined ? null : <Mark star={star} scale={scale} hasName={stars.length > mostNames} />}
      </svg>
      <figcaption className="mt-2 text-small text-ink-2">
        <Legend />
      </figcaption>
    </figure>
  );
}

interface StarsProps {
  readonly stars: readonly FieldStar[];
  readonly scale: Scale;
  readonly onPoint: (index: number) => void;
  readonly onPick: (index: number) => void;
}

/** Drawn once: pointing at a star moves the mark, not the stars. */
const Stars = memo(function Stars({ stars, scale, onPoint, onPick }: StarsProps) {
  return stars.map((star, index) => {
    const [x, y, radius] = [scale.x(star), scale.y(star), radiusOf(star.v)];
    return (
      <g
        key={star.name}
        onMouseEnter={() => onPoint(index)}
        onClick={() => onPick(index)}
        className="cursor-pointer"
      >
        <circle cx={x} cy={y} r={Math.max(9, radius + 3)} className="fill-transparent" />
        <Dot x={x} y={y} radius={radius} isUsable={star.isUsable} hasCaution={star.caution !== ''} />
        {stars.length > mostNames ? null : <Name star={star} x={x} y={y} radius={radius} />}
      </g>
    );
  });
});

interface DotProps {
  readonly x: number;
  readonly y: number;
  readonly radius: number;
  readonly isUsable: boolean;
  readonly hasCaution: boolean;
}

/** Usable stars are discs, with a broken ring where care is asked; a star not to be used is a cross. */
function Dot({ x, y, radius, isUsable, hasCaution }: DotProps) {
  if (!isUsable) {
    const arm = radius + 2;
    return (
      <path
        d={`M${x - arm} ${y - arm}L${x + arm} ${y + arm}M${x - arm} ${y + arm}L${x + arm} ${y - arm}`}
        className="fill-none stroke-bad stroke-2"
      />
    );
  }
  return (
    <>
      <circle cx={x} cy={y} r={radius} className="fill-ink" />
      {hasCaution ? (
        <circle cx={x} cy={y} r={radius + 3.5} className="fill-none stroke-ink-2" strokeDasharray="3 2.5" />
      ) : null}
    </>
  );
}

interface NameProps {
  readonly star: FieldStar;
  readonly x: number;
  readonly y: number;
  readonly radius: number;
}

/** Beside the star, on the side that has room. */
function Name({ star, x, y, radius }: NameProps) {
  const isRight = x < side * 0.68;
  return (
    <text
      x={isRight ? x + radius + 5 : x - radius - 5}
      y={y + 4}
      textAnchor={isRight ? 'start' : 'end'}
      className="fill-ink text-fine"
    >
      {star.name}
    </text>
  );
}

function Mark({
  star,
  scale,
  hasName,
}: {
  readonly star: FieldStar;
  readonly scale: Scale;
  readonly hasName: boolean;
}) {
  const [x, y, radius] = [scale.x(star), scale.y(star), radiusOf(star.v)];
  return (
    <g pointerEvents="none">
      <circle cx={x} cy={y} r={radius + 6} className="fill-none stroke-accent stroke-2" />
      {hasName ? <Name star={star} x={x} y={y} radius={radius + 3} /> : null}
    </g>
  );
}

function Compass() {
  const [x, y, arm] = [side - 18, side - 16, 26];
  return (
    <g aria-hidden="true" className="fill-none stroke-ink-2">
      <path d={`M${x} ${y}V${y - arm}m-3 5l3 -5l3 5M${x} ${y}H${x - arm}m5 -3l-5 3l5 3`} />
      <text x={x} y={y - arm - 4} textAnchor="middle" className="fill-ink-2 stroke-none text-fine">
        N
      </text>
      <text x={x - arm - 4} y={y + 4} textAnchor="end" className="fill-ink-2 stroke-none text-fine">
        E
      </text>
    </g>
  );
}

const barLengths_arcmin = [0.5, 1, 2, 5, 10, 20, 30];

function ScaleBar({ px_perDeg }: { readonly px_perDeg: number }) {
  const fits = barLengths_arcmin.filter((length) => (length / 60) * px_perDeg < side * 0.3);
  const length = fits.at(-1) ?? 0.5;
  const width = (length / 60) * px_perDeg;
  return (
    <g aria-hidden="true">
      <path d={`M12 ${side - 18}v5h${width}v-5`} className="fill-none stroke-ink-2" />
      <text x={12 + width / 2} y={side - 19} textAnchor="middle" className="fill-ink-2 text-fine">
        {length}′
      </text>
    </g>
  );
}

const legendMagnitudes = [10, 12, 14, 16] as const;

function Legend() {
  return (
    <span className="flex flex-wrap items-center gap-x-4 gap-y-1">
      {legendMagnitudes.map((v) => (
        <span key={v} className="inline-flex items-center gap-1">
          <svg viewBox="0 0 20 20" className="h-5 w-5" aria-hidden="true">
            <circle cx="10" cy="10" r={radiusOf(v)} className="fill-ink" />
          </svg>
          V {v}
        </span>
      ))}
      <span className="inline-flex items-center gap-1">
        <svg viewBox="0 0 20 20" className="h-5 w-5" aria-hidden="true">
          <Dot x={10} y={10} radius={4} isUsable hasCaution />
        </svg>
        with care
      </span>
      <span className="inline-flex items-center gap-1">
        <svg viewBox="0 0 20 20" className="h-5 w-5" aria-hidden="true">
          <Dot x={10} y={10} radius={4} isUsable={false} hasCaution />
        </svg>
        not to be used
      </span>
    </span>
  );
}
