/** A star on the drawing [px]. */
export interface ChartDot {
  readonly x: number;
  readonly y: number;
  readonly radius: number;
  readonly name: string;
}

/** Where a name stands: its baseline's end that the anchor names [px]. */
export interface NamePlace {
  readonly x: number;
  readonly y: number;
  readonly anchor: 'start' | 'middle' | 'end';
}

interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** Room between a star, with the ring of the star pointed at, and its name. */
const gap = 9;
/** IBM Plex Sans at 11 px, on the generous side. */
const letterWidth = 6.3;
const [ascent, descent] = [9, 3];

function boxOf({ x, y, anchor }: NamePlace, name: string): Box {
  const width = name.length * letterWidth;
  const left = anchor === 'start' ? x : anchor === 'end' ? x - width : x - width / 2;
  return { left, right: left + width, top: y - ascent, bottom: y + descent };
}

const meet = (a: Box, b: Box): boolean =>
  a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;

const around = ({ x, y, radius }: ChartDot): Box => ({
  left: x - radius - 1,
  right: x + radius + 1,
  top: y - radius - 1,
  bottom: y + radius + 1,
});

/** Right, left, below, above: in the order in which people expect them. */
function candidates({ x, y, radius }: ChartDot): readonly NamePlace[] {
  return [
    { x: x + radius + gap, y: y + 4, anchor: 'start' },
    { x: x - radius - gap, y: y + 4, anchor: 'end' },
    { x, y: y + radius + gap + ascent, anchor: 'middle' },
    { x, y: y - radius - gap, anchor: 'middle' },
  ];
}

/**
 * A place for the name of each star: the first beside it that covers no star and no name placed before, and is on the
 * drawing; the first of all where there is none.
 */
export function placeNames(dots: readonly ChartDot[], side: number): readonly NamePlace[] {
  const taken: Box[] = dots.map(around);
  return dots.map((dot, index) => {
    const isFree = (place: NamePlace): boolean => {
      const box = boxOf(place, dot.name);
      const isInside = box.left > 2 && box.right < side - 2 && box.top > 2 && box.bottom < side - 2;
      return isInside && taken.every((other, place_) => place_ === index || !meet(box, other));
    };
    const all = candidates(dot);
    const place = all.find(isFree) ?? all.find((each) => boxOf(each, dot.name).right < side) ?? all[1];
    const chosen = place ?? { x: dot.x, y: dot.y, anchor: 'start' as const };
    taken.push(boxOf(chosen, dot.name));
    return chosen;
  });
}
