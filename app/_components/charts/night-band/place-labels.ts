/** Labels that do not run into each other: each takes the first of its places that is free, or is left out. */

export interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export type Anchor = 'start' | 'middle' | 'end';

export interface LabelPlace {
  readonly x: number;
  /** Of the baseline. */
  readonly y: number;
  readonly anchor: Anchor;
  readonly text: string;
}

/** Mean advance of IBM Plex Sans in ems; a little generous, so that estimates err apart. */
const advance_em = 0.56;

/** About how wide a text is. */
export function textWidth(text: string, size: number): number {
  return text.length * size * advance_em;
}

/** The box that a label takes at a place. */
export function labelBox({ x, y, anchor, text }: LabelPlace, size: number): Box {
  const width = textWidth(text, size);
  const left = x - { start: 0, middle: width / 2, end: width }[anchor];
  return { left, right: left + width, top: y - size * 0.8, bottom: y + size * 0.25 };
}

export function overlaps(a: Box, b: Box, gap = 0): boolean {
  return a.left < b.right + gap && b.left < a.right + gap && a.top < b.bottom + gap && b.top < a.bottom + gap;
}

export interface LabelRules {
  readonly size: number;
  /** Labels stay inside. */
  readonly within: Box;
  /** Taken already. */
  readonly taken: readonly Box[];
  readonly gap?: number;
}

/**
 * Places labels in the order given, each at the first of its candidates that touches nothing placed before. A label
 * without a free place comes out as null.
 */
export function placeLabels(
  labels: readonly (readonly LabelPlace[])[],
  { size, within, taken, gap = 3 }: LabelRules,
): readonly (LabelPlace | null)[] {
  const boxes = [...taken];
  return labels.map((candidates) => {
    for (const candidate of candidates) {
      const box = labelBox(candidate, size);
      const isInside =
        box.left >= within.left &&
        box.right <= within.right &&
        box.top >= within.top &&
        box.bottom <= within.bottom;
      if (!isInside || boxes.some((other) => overlaps(box, other, gap))) continue;
      boxes.push(box);
      return candidate;
    }
    return null;
  });
}
