import { memo } from 'react';
import { placeNames, type ChartDot, type NamePlace } from '@/app/_components/charts/place-names';
import type { FieldStar } from './field-star';

interface SkyChartProps {
  readonly stars: readonly FieldStar[];
  readonly active: number;
  readonly onPoint: (index: number) => void;
  readonly onPick: (index: number) => void;
}

/** Side of the drawing; it is scaled to the room there is. */
const side = 360;
const margin = 24;
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

/** Bright stars are large dots: 1.4 px at V = 16.5, three quarters more for each magnitude. */
const radiusOf = (v: number): number => Math.min(7.5, Math.max(1.4, 1.4 + 0.75 * (16.5 - v)));

function dotsOf(stars: readonly FieldStar[]): readonly ChartDot[] {
  const { x, y } = scaleOf(stars);
  return stars.map((star) => ({ x: x(star), y: y(star), radius: radiusOf(star.v), name: star.name }));
}

/** The stars of a field as the sky shows them. The table beside it says the same for those who cannot see it. */
export function SkyChart({ stars, active, onPoint, onPick }: SkyChartProps) {
  const star = stars[active];
  const dots = dotsOf(stars);
  const names = placeNames(dots, side);
  const [dot, name] = [dots[active], names[active]];
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
        <ScaleBar px_perDeg={scaleOf(stars).px_perDeg} />
        <Stars stars={stars} onPoint={onPoint} onPick={onPick} />
        {star === undefined || dot === undefined || name === undefined ? null : (
          <g pointerEvents="none">
            <circle cx={dot.x} cy={dot.y} r={dot.radius + 5} className="fill-none stroke-accent stroke-2" />
            {stars.length > mostNames ? <Name text={star.name} place={name} /> : null}
          </g>
        )}
      </svg>
      <figcaption className="mt-2 text-small text-ink-2">
        <Legend />
      </figcaption>
    </figure>
  );
}

interface StarsProps {
  readonly stars: readonly FieldStar[];
  readonly onPoint: (index: number) => void;
  readonly onPick: (index: number) => void;
}

/** Drawn once: pointing at a star moves the mark, not the stars. */
const Stars = memo(function Stars({ stars, onPoint, onPick }: StarsProps) {
  const dots = dotsOf(stars);
  const names = stars.length > mostNames ? [] : placeNames(dots, side);
  return stars.map((star, index) => {
    const [dot, name] = [dots[index], names[index]];
    if (dot === undefined) return null;
    const { x, y, radius } = dot;
    return (
      <g
        key={star.name}
        data-star={star.name}
        onMouseEnter={() => onPoint(index)}
        onClick={() => onPick(index)}
        className="cursor-pointer"
      >
        <circle cx={x} cy={y} r={Math.max(8, radius + 3)} className="fill-transparent" />
        <Dot x={x} y={y} radius={radius} isUsable={star.isUsable} hasCaution={star.caution !== ''} />
        {name === undefined ? null : <Name text={star.name} place={name} />}
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

function Name({ text, place }: { readonly text: string; readonly place: NamePlace }) {
  return (
    <text x={place.x} y={place.y} textAnchor={place.anchor} className="fill-ink text-fine">
      {text}
    </text>
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
