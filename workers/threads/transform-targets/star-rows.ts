import type { Slice } from '@/lib/contracts/measurement-check';
import { nBands } from '@/lib/photometry/bands';
import { calibratedQuantities, type CalibratedStars } from '@/lib/photometry/target-measurements';
import { numberField, rowFile, textField } from '../row-files';
import type { TransformOrder, Transformed } from './messages';

/** Writes the stars that have a magnitude or colour, as lines for LOAD DATA; the others have nothing to tell. */
export function writeStars(
  { folder, names, ra, dec }: Pick<TransformOrder, 'folder' | 'names' | 'ra' | 'dec'>,
  stars: CalibratedStars,
): Omit<Transformed, 'nWithoutAirmass'> {
  const slices: Slice[] = [];
  const file = rowFile(folder, 'stars', (slice) => slices.push(slice));
  let nStars = 0;
  for (let star = 0; star < names.length; star += 1) {
    if (!hasResult(stars, star)) continue;
    nStars += 1;
    file.write(line(stars, star, [names[star] ?? '', ra[star] ?? NaN, dec[star] ?? NaN], nStars));
  }
  file.close();
  return { nStars, slices };
}

const hasResult = ({ columns }: CalibratedStars, star: number): boolean =>
  calibratedQuantities.some((name) => Number.isFinite(columns[name].value[star] ?? NaN));

function line(
  { columns, counts, bjd, airmass, flags }: CalibratedStars,
  star: number,
  [name, ra, dec]: readonly [string, number, number],
  number: number,
): string {
  const fields: string[] = [String(number), textField(name), numberField(ra), numberField(dec)];
  for (let band = 0; band < nBands; band += 1) fields.push(String(counts[star * nBands + band]));
  for (const quantity of calibratedQuantities) {
    const { value, random, systematic } = columns[quantity];
    for (const column of [value, random, systematic]) fields.push(numberField(column[star] ?? NaN));
  }
  fields.push(numberField(bjd[star] ?? NaN), numberField(airmass[star] ?? NaN), String(flags[star]));
  return fields.join('\t');
}
