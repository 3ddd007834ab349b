import { formatMinutes } from '@/app/_components/ui/format-time';
import { airmassTicks, airmassY, drawCurve, type CurveArea, type DrawnCurve } from './airmass-curves';
import type { BandInput } from './band-input';
import { marksOf, rowsOf, type Mark, type RowName } from './frame-marks';
import type { NightSky } from './night-sky';
import { labelBox, placeLabels, type Box, type LabelPlace } from './place-labels';
import { skyStops, type ShadeStop } from './sky-shading';
import { hourTicks, xOf, type HourTick, type TimeScale } from './time-scale';

/** Everything that the night band draws, in px: plain data from plain data. */
export interface BandLayout {
  readonly scale: TimeScale;
  readonly height: number;
  /** The shaded strip. */
  readonly top: number;
  readonly bottom: number;
  /** Between the curves and the rows of marks. */
  readonly divide: number;
  readonly stops: readonly ShadeStop[];
  readonly sunLabels: readonly LabelPlace[];
  readonly moonBars: readonly { readonly x: number; readonly width: number }[];
  readonly moonLabel: LabelPlace | null;
  readonly curves: readonly DrawnCurve[];
  readonly curveLabels: readonly LabelPlace[];
  readonly airmass: readonly { readonly y: number; readonly text: string }[];
  readonly rows: readonly { readonly name: RowName; readonly y: number }[];
  readonly marks: readonly Mark[];
  readonly clouds: readonly LabelPlace[];
  readonly cloudY: number;
  readonly hours: readonly HourTick[];
  readonly hoursY: number;
  readonly nowX: number | null;
  readonly nowLabel: LabelPlace | null;
  /** Frames too far in daylight to be on the strip. */
  readonly earlier: number;
  readonly later: number;
}

/** Sizes, px. */
const top = 26;
const curvesHeight = 136;
const rowHeight = 19;
export const labelSize = 11;

export function bandLayout({ sky, frames, conditions, width, now }: BandInput): BandLayout {
  const scale: TimeScale = { start: sky.start, end: sky.end, width };
  const names = rowsOf(frames);
  const divide = top + curvesHeight;
  const rows = names.map((name, i) => ({ name, y: divide + 14 + i * rowHeight }));
  const bottom = divide + 8 + Math.max(1, names.length) * rowHeight;
  const area: CurveArea = { top: top + 20, bottom: divide - 6 };
  const curves = sky.curves.map((curve) => drawCurve(curve, { sky, scale, area }));
  const nowX = now !== null && now >= sky.start && now <= sky.end ? xOf(scale, now) : null;
  const inSky = labelsInSky({ sky, scale, curves, nowX, divide });
  const cloudY = bottom + 18;
  return {
    scale,
    height: bottom + 50,
    top,
    bottom,
    divide,
    stops: skyStops(sky),
    sunLabels: sunLabels(sky, scale),
    moonBars: sky.moonUp.map(({ start, end }) => ({
      x: xOf(scale, start),
      width: xOf(scale, end) - xOf(scale, start),
    })),
    ...inSky,
    curves,
    airmass: airmassTicks.map((airmass) => ({ y: airmassY(area, airmass), text: airmass.toFixed(1) })),
    rows,
    marks: marksOf(frames, scale, new Map(rows.map(({ name, y }) => [name, y]))),
    clouds: cloudLabels(conditions, scale, cloudY),
    cloudY,
    hours: hourTicks(scale),
    hoursY: bottom + 42,
    nowX,
    earlier: frames.filter(({ utc }) => utc < sky.start).length,
    later: frames.filter(({ utc }) => utc > sky.end).length,
  };
}

function isPlaced(label: LabelPlace | null): label is LabelPlace {
  return label !== null;
}

/** Sunset, twilight and sunrise above the strip; long words where there is room, short ones where not. */
function sunLabels(sky: NightSky, scale: TimeScale): readonly LabelPlace[] {
  const y = 17;
  const at = (utc: number | null, texts: readonly string[], anchors: readonly LabelPlace['anchor'][]) =>
    utc === null
      ? []
      : texts.flatMap((text) =>
          anchors.map((anchor): LabelPlace => ({
            x: xOf(scale, utc),
            y,
            anchor,
            text: `${text} ${formatMinutes(utc)}`,
          })),
        );
  const note: readonly LabelPlace[] =
    sky.sunNote === null
      ? []
      : [
          { x: scale.width / 2, y, anchor: 'middle', text: sky.sunNote },
          { x: 0, y, anchor: 'start', text: sky.sunNote },
        ];
  const labels = [
    at(sky.sunset, ['sunset'], ['start', 'middle', 'end']),
    at(sky.sunrise, ['sunrise'], ['end', 'middle', 'start']),
    note,
    at(sky.duskEnds, ['astronomical twilight ends', 'twilight ends', 'dark'], ['middle', 'start']),
    at(sky.dawnBegins, ['astronomical twilight begins', 'twilight begins', 'dawn'], ['middle', 'end']),
  ];
  const within: Box = { left: -1, right: scale.width + 1, top: 0, bottom: top };
  return placeLabels(labels, { size: labelSize, within, taken: [], gap: 8 }).filter(isPlaced);
}

interface SkyLabels {
  readonly sky: NightSky;
  readonly scale: TimeScale;
  readonly curves: readonly DrawnCurve[];
  readonly nowX: number | null;
  readonly divide: number;
}

/** Names within the strip: now first, then the Moon, then the fields, so that what matters most keeps its place. */
function labelsInSky({ sky, scale, curves, nowX, divide }: SkyLabels) {
  const rules = {
    size: labelSize,
    within: { left: 2, right: scale.width - 2, top: top + 2, bottom: divide },
  };
  const nowPlaces: readonly LabelPlace[] =
    nowX === null
      ? []
      : [
          { x: nowX + 5, y: top + 14, anchor: 'start', text: 'now' },
          { x: nowX - 5, y: top + 14, anchor: 'end', text: 'now' },
        ];
  const [nowLabel = null, moonLabel = null] = placeLabels([nowPlaces, moonPlaces(sky, scale)], {
    ...rules,
    taken: [],
  });
  const fixed = [nowLabel, moonLabel].filter(isPlaced).map((label) => labelBox(label, labelSize));
  const nowLine: readonly Box[] = nowX === null ? [] : [{ left: nowX, right: nowX, top, bottom: divide }];
  const curveLabels = placeLabels(
    curves.map(({ labels }) => labels),
    { ...rules, taken: [...fixed, ...nowLine] },
  ).filter(isPlaced);
  return { nowLabel, moonLabel, curveLabels };
}

function moonPlaces(sky: NightSky, scale: TimeScale): readonly LabelPlace[] {
  const lit = `${Math.round(sky.moonLit * 100)} %`;
  const texts = [`Moon up, ${lit}, ${sky.isMoonWaxing ? 'waxing' : 'waning'}`, `Moon ${lit}`];
  return texts.flatMap((text) =>
    sky.moonUp.flatMap(({ start, end }): LabelPlace[] => [
      { x: xOf(scale, start) + 5, y: top + 16, anchor: 'start', text },
      { x: xOf(scale, end) - 5, y: top + 16, anchor: 'end', text },
      { x: xOf(scale, (start + end) / 2), y: top + 16, anchor: 'middle', text },
    ]),
  );
}

/** Eighths of cloud; where entries crowd, the later ones stay. */
function cloudLabels(
  conditions: BandInput['conditions'],
  scale: TimeScale,
  y: number,
): readonly LabelPlace[] {
  const known = conditions
    .filter(({ cloud, utc }) => cloud !== null && utc >= scale.start && utc <= scale.end)
    .toSorted((a, b) => b.utc - a.utc);
  const places = known.map(({ utc, cloud }): LabelPlace[] => {
    const text = `${cloud}/8`;
    return [
      { x: xOf(scale, utc), y, anchor: 'middle', text },
      { x: 0, y, anchor: 'start', text },
      { x: scale.width, y, anchor: 'end', text },
    ].filter(({ x }) => Math.abs(x - xOf(scale, utc)) < 14) as LabelPlace[];
  });
  return placeLabels(places, {
    size: labelSize,
    within: { left: -1, right: scale.width + 1, top: 0, bottom: Infinity },
    taken: [],
    gap: 2,
  }).filter(isPlaced);
}
