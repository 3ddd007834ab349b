/** How findings and reasons are said: names of coefficients, lists, figures. */
import { bandPlace, type BandName } from './bands';
import { type CoefficientName } from './fit-model';

export const coefficientWords = {
  zeroPoint: 'zero point',
  extinction: 'extinction',
  colourTerm: 'colour term',
  secondOrderExtinction: 'second-order extinction',
  drift: 'drift of the zero point',
  extinctionDrift: 'drift of the extinction',
  colourTerm2: 'quadratic colour term',
} as const satisfies Record<CoefficientName, string>;

/** Colour index of each band, as it is written. */
const indexWords = ['U−B', 'B−V', 'B−V', 'V−R', 'V−I'] as const;

/** The colour index that goes with a band, as it is written.
 * @param band - of the standard system
 * @returns such as B−V
 * @source default colour indices of this program: common practice, no source */
export function colourIndexWords(band: BandName): string {
  return indexWords[bandPlace[band]]!;
}

/** A list as it is said.
 * @param words - parts, shape (n)
 * @returns such as "a, b and c"
 * @source definition */
export function listed(words: readonly string[]): string {
  return words.length < 2 ? (words[0] ?? '') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}

/** A count with its noun.
 * @param n - count [1]
 * @param one - noun in the singular
 * @param many - in the plural; with an s where not given
 * @returns such as "3 stars"
 * @source definition */
export function counted(n: number, one: string, many = `${one}s`): string {
  return `${n === 0 ? 'no' : String(n)} ${n === 1 ? one : many}`;
}

/** A figure with a true minus.
 * @param value - any
 * @param digits - behind the point [1]
 * @returns such as "−0.03"; a zero has no sign
 * @source definition */
export function figure(value: number, digits: number): string {
  const words = value.toFixed(digits);
  return Number(words) === 0 ? words.replace('-', '') : words.replace('-', '−');
}

/** A sentence with a capital at its beginning.
 * @param words - the sentence
 * @returns likewise
 * @source definition */
export function sentence(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** A difference in magnitudes as fainter or brighter.
 * @param shift - observed less expected [mag]
 * @returns such as "0.123 mag fainter"
 * @source definition: larger magnitudes are fainter */
export function fainterOrBrighter(shift: number): string {
  return `${Math.abs(shift).toFixed(3)} mag ${shift < 0 ? 'brighter' : 'fainter'}`;
}
