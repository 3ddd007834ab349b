import type { SkyField } from '@/app/_components/charts/night-band/night-sky';
import type { Frame } from '@/lib/contracts/api/frame';

/** More curves than this are a thicket: the fields with most frames are drawn. */
const most = 8;

/** The fields that frames were taken of, for their airmass curves: by standard field, else by object. */
export function fieldsTaken(frames: readonly Frame[]): readonly SkyField[] {
  const fields = new Map<string, SkyField & { readonly count: number }>();
  for (const { type, field, object, ra, dec } of frames) {
    if ((type !== 'standard' && type !== 'target') || ra === null || dec === null) continue;
    const name = field ?? object;
    const known = fields.get(name);
    fields.set(name, known ? { ...known, count: known.count + 1 } : { name, ra, dec, count: 1 });
  }
  return [...fields.values()]
    .toSorted((a, b) => b.count - a.count)
    .slice(0, most)
    .map(({ name, ra, dec }) => ({ name, ra, dec }));
}
