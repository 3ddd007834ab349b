import { describe, expect, it } from 'vitest';
import { bandLayout, labelSize } from '@/app/_components/charts/night-band/band-layout';
import { labelBox, overlaps, placeLabels } from '@/app/_components/charts/night-band/place-labels';
import { skyColour } from '@/app/_components/charts/night-band/sky-shading';
import { hourTicks, utcAt, xOf } from '@/app/_components/charts/night-band/time-scale';
import { autumnNight, frame } from './night';

const evening = '2026-11-03T21:00:00Z';
const nothing = { frames: [], conditions: [], now: null } as const;

describe('the layout of the night band', () => {
  it.each([320, 640, 1280, 2400])(
    'lets no label run into another at %s px, with the Moon and now',
    (width) => {
      const sky = autumnNight();
      const now = Date.parse('2026-11-03T23:26:00Z');
      const layout = bandLayout({ sky, frames: [frame(evening)], conditions: [], width, now });
      const labels = [layout.moonLabel, layout.nowLabel, ...layout.curveLabels].filter(
        (label) => label !== null,
      );
      const boxes = labels.map((label) => labelBox(label, labelSize));
      const clashes = boxes.flatMap((a, i) => boxes.slice(i + 1).filter((b) => overlaps(a, b)));
      expect(labels.length).toBeGreaterThan(1);
      expect(clashes).toEqual([]);
    },
  );

  it.each([320, 640, 1280])('keeps the labels of Sun and twilight apart and inside at %s px', (width) => {
    const { sunLabels } = bandLayout({ sky: autumnNight(), ...nothing, width });
    const boxes = sunLabels.map((label) => labelBox(label, labelSize));
    expect(sunLabels.map(({ text }) => text)).toContainEqual(expect.stringMatching(/^sunset \d\d:\d\d$/));
    expect(boxes.flatMap((a, i) => boxes.slice(i + 1).filter((b) => overlaps(a, b)))).toEqual([]);
    expect(boxes.every(({ left, right }) => left >= -1 && right <= width + 1)).toBe(true);
  });

  it('gives each band in use its row, blue to red, and bias, dark and flat one of their own', () => {
    const frames = [
      frame(evening, { band: 'I' }),
      frame(evening, { band: 'B' }),
      frame(evening, { type: 'flat', band: 'V' }),
      frame(evening, { type: 'bias', band: null }),
    ];
    const layout = bandLayout({ sky: autumnNight(), ...nothing, frames, width: 1280 });
    expect(layout.rows.map(({ name }) => name)).toEqual(['B', 'I', 'other']);
  });

  it('draws standards full, targets hollow, and the others by shapes of their own', () => {
    const frames = (['standard', 'target', 'focus', 'test', 'dark'] as const).map((type) =>
      frame(evening, { type }),
    );
    const layout = bandLayout({ sky: autumnNight(), ...nothing, frames, width: 1280 });
    expect(layout.marks.map(({ shape }) => shape)).toEqual(['full', 'hollow', 'focus', 'test', 'tick']);
  });

  it('puts each mark at its mid-exposure', () => {
    const sky = autumnNight();
    const layout = bandLayout({ sky, ...nothing, frames: [frame(evening)], width: 1000 });
    const share = (Date.parse(evening) - sky.start) / (sky.end - sky.start);
    expect(layout.marks[0]?.x).toBe(Math.round(share * 10_000) / 10);
  });

  it('counts the frames that lie too far in daylight instead of dropping them unsaid', () => {
    const frames = [
      frame('2026-11-03T14:00:00Z', { type: 'bias', band: null }),
      frame('2026-11-04T11:00:00Z'),
    ];
    const layout = bandLayout({ sky: autumnNight(), ...nothing, frames, width: 1280 });
    expect([layout.marks.length, layout.earlier, layout.later]).toEqual([0, 1, 1]);
  });

  it('keeps the latest cloud where entries crowd', () => {
    const conditions = [0, 1, 2, 3].map((cloud) => ({ cloud, utc: Date.parse(evening) + cloud * 60_000 }));
    const layout = bandLayout({ sky: autumnNight(), ...nothing, conditions, width: 640 });
    expect(layout.clouds.map(({ text }) => text)).toEqual(['3/8']);
  });

  it('shows now only while it is night', () => {
    const sky = autumnNight();
    expect(bandLayout({ sky, ...nothing, width: 800, now: sky.start - 1 }).nowX).toBeNull();
    expect(bandLayout({ sky, ...nothing, width: 800, now: sky.start + 1 }).nowX).not.toBeNull();
  });
});

describe('the time scale', () => {
  const scale = {
    start: Date.parse('2026-11-03T18:10:00Z'),
    end: Date.parse('2026-11-04T07:20:00Z'),
    width: 640,
  };

  it('turns a place into its instant and back', () => {
    expect(Math.abs(xOf(scale, utcAt(scale, 123)) - 123)).toBeLessThan(1e-6);
  });

  it('keeps instants within the strip', () => {
    expect([utcAt(scale, -50), utcAt(scale, 9999)]).toEqual([scale.start, scale.end]);
  });

  it.each([
    [1280, 1],
    [400, 2],
    [220, 3],
  ])('at %s px labels every %s h', (width, step) => {
    const texts = hourTicks({ ...scale, width }).flatMap(({ text }) => text ?? []);
    expect(texts.length).toBeGreaterThan(2);
    expect(texts.every((text) => Number(text.slice(0, 2)) % step === 0)).toBe(true);
  });
});

describe('the shading', () => {
  it.each([
    [5, 'var(--sky-0)'],
    [-3, 'color-mix(in srgb, var(--sky-6) 50%, var(--sky-0))'],
    [-15, 'color-mix(in srgb, var(--sky-18) 50%, var(--sky-12))'],
    [-60, 'var(--sky-night)'],
  ])('under a Sun at %s° is %s', (altitude, colour) => {
    expect(skyColour(altitude)).toBe(colour);
  });
});

describe('labels', () => {
  it('take their next place when the first is taken, and are left out when none is free', () => {
    const here = { x: 10, y: 20, anchor: 'start', text: 'one' } as const;
    const there = { ...here, y: 60 };
    const within = { left: 0, right: 100, top: 0, bottom: 100 };
    expect(placeLabels([[here], [here, there], [here]], { size: 11, within, taken: [] })).toEqual([
      here,
      there,
      null,
    ]);
  });
});
