import { createWriteStream } from 'node:fs';
import { once } from 'node:events';
import { finished } from 'node:stream/promises';

export interface TableShape {
  readonly frames: number;
  readonly stars: number;
  readonly hasNames: boolean;
}

/** A million rows: a night of a small camera, with names. */
export const million: TableShape = { frames: 100, stars: 10_000, hasNames: true };

/** A generator of numbers in 0 to 1 that gives the same ones every time (a 32-bit mixing step of our own choice of constants). */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

/** Writes a measurement table with every star on every frame and all columns filled. */
export async function writeTable(file: string, { frames, stars, hasNames }: TableShape): Promise<void> {
  const random = seeded(20_261_103);
  const places = Array.from({ length: stars }, () => [100 + 2 * random(), 40 + 2 * random()] as const);
  const out = createWriteStream(file);
  out.write('frame,star,ra,dec,inst_mag,inst_err,x,y,fwhm,sky,peak,flag\n');
  for (let frame = 1; frame <= frames; frame += 1) {
    let text = '';
    for (const [star, [ra, dec]] of places.entries()) {
      const jitter = (): number => (random() - 0.5) * 1e-5;
      text += `${frame},${hasNames ? `T3-${star + 1}` : ''},${(ra + jitter()).toFixed(6)},${(dec + jitter()).toFixed(6)},`;
      text += `${(-12 + 8 * random()).toFixed(4)},${(0.002 + 0.05 * random()).toFixed(4)},`;
      text += `${(4096 * random()).toFixed(2)},${(4096 * random()).toFixed(2)},${(2 + random()).toFixed(2)},`;
      text += `${(100 + 50 * random()).toFixed(1)},${(60_000 * random()).toFixed(0)},${random() < 0.01 ? 'edge' : ''}\n`;
    }
    if (!out.write(text)) await once(out, 'drain');
  }
  out.end();
  await finished(out);
}
