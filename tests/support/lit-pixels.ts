import { inflateSync } from 'node:zlib';

interface Pixels {
  readonly width: number;
  readonly height: number;
  /** Bytes a pixel: 3 or 4. */
  readonly depth: number;
  readonly bytes: Buffer;
}

/** The filters of PNG 1.2, section 6: what a byte was predicted from its neighbours. */
function predicted(filter: number, left: number, above: number, corner: number): number {
  if (filter === 1) return left;
  if (filter === 2) return above;
  if (filter === 3) return (left + above) >> 1;
  if (filter !== 4) return 0;
  const guess = left + above - corner;
  const [a, b, c] = [Math.abs(guess - left), Math.abs(guess - above), Math.abs(guess - corner)];
  if (a <= b && a <= c) return left;
  return b <= c ? above : corner;
}

/** The pixels of a screenshot: PNG, 8 bits a channel, with or without alpha, not interlaced, as Chromium makes them. */
function decode(png: Buffer): Pixels {
  const data: Buffer[] = [];
  for (let at = 8; at < png.length; at += 12 + png.readUInt32BE(at)) {
    const kind = png.toString('latin1', at + 4, at + 8);
    if (kind === 'IDAT') data.push(png.subarray(at + 8, at + 8 + png.readUInt32BE(at)));
  }
  const [width, height] = [png.readUInt32BE(16), png.readUInt32BE(20)];
  const depth = png[25] === 6 ? 4 : 3;
  const stride = width * depth;
  const raw = inflateSync(Buffer.concat(data));
  const bytes = Buffer.alloc(stride * height);
  for (let y = 0; y < height; y += 1) {
    const filter = raw[y * (stride + 1)] ?? 0;
    for (let x = 0; x < stride; x += 1) {
      const at = y * stride + x;
      const left = x >= depth ? (bytes[at - depth] ?? 0) : 0;
      const above = y > 0 ? (bytes[at - stride] ?? 0) : 0;
      const corner = x >= depth && y > 0 ? (bytes[at - stride - depth] ?? 0) : 0;
      bytes[at] = ((raw[y * (stride + 1) + 1 + x] ?? 0) + predicted(filter, left, above, corner)) & 255;
    }
  }
  return { width, height, depth, bytes };
}

export interface LitPixels {
  /** Pixels with any green or blue in them. */
  readonly count: number;
  /** The first of them: `x, y: r g b`. */
  readonly first: string | null;
  /** Pixels with any red at all: a page that is black all over proves nothing. */
  readonly red: number;
}

/** Looks at every pixel of a screenshot for green and blue. */
export function litPixels(png: Buffer): LitPixels {
  const { width, depth, bytes } = decode(png);
  let [count, red] = [0, 0];
  let first: string | null = null;
  for (let at = 0; at < bytes.length; at += depth) {
    const [r = 0, g = 0, b = 0] = bytes.subarray(at, at + 3);
    if (r > 0) red += 1;
    if (g === 0 && b === 0) continue;
    count += 1;
    const pixel = at / depth;
    first ??= `${pixel % width}, ${Math.floor(pixel / width)}: ${r} ${g} ${b}`;
  }
  return { count, first, red };
}
