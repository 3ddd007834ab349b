import { describe, expect, it } from 'vitest';
import { placeNames, type ChartDot } from '@/app/_components/charts/place-names';

const side = 360;
const dot = (x: number, y: number, name = 'SA 1'): ChartDot => ({ x, y, radius: 4, name });

describe('names on a chart', () => {
  it('stand to the right of their star where there is room', () => {
    const [place] = placeNames([dot(100, 100)], side);
    expect(place?.anchor).toBe('start');
    expect(place?.x).toBeGreaterThan(104);
  });

  it('move to the left at the right edge, and below where the left is taken', () => {
    expect(placeNames([dot(350, 100)], side)[0]?.anchor).toBe('end');
    expect(placeNames([dot(340, 100), dot(318, 100)], side)[0]?.anchor).not.toBe('end');
  });

  it('cover neither another star nor another name', () => {
    const dots = [dot(100, 100, 'first'), dot(122, 100, 'second'), dot(100, 110, 'third')];
    const places = placeNames(dots, side);
    const boxes = places.map(({ x, y, anchor }, index) => {
      const width = (dots[index]?.name.length ?? 0) * 6;
      const left = anchor === 'start' ? x : anchor === 'end' ? x - width : x - width / 2;
      return { left, right: left + width, top: y - 8, bottom: y + 2 };
    });
    for (const [i, a] of boxes.entries()) {
      for (const b of boxes.slice(i + 1)) {
        expect(a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom).toBe(false);
      }
      for (const { x, y } of dots) {
        expect(x + 4 > a.left && x - 4 < a.right && y + 4 > a.top && y - 4 < a.bottom).toBe(false);
      }
    }
  });

  it('stay on the drawing even where nothing is free', () => {
    const crowd = Array.from({ length: 30 }, (_, k) =>
      dot(340 + (k % 6) * 3, 10 + k, 'a long name of a star'),
    );
    for (const place of placeNames(crowd, side)) expect(place.x).toBeLessThanOrEqual(side);
  });
});
