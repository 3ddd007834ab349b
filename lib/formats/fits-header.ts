/**
 * The header of a FITS file, from its first bytes: what each keyword says. FITS standard 4.0, section 4; also long
 * strings by CONTINUE. Nothing of the data is read, so that a browser needs a few kilobytes of each file only.
 */
export const fitsBlock = 2880;
const cardLength = 80;
const decoder = new TextDecoder('latin1');

export type FitsValue = string | number | boolean | null;

export interface FitsHeader {
  /** Keyword to value; of keywords that stand twice, the first. */
  readonly values: ReadonlyMap<string, FitsValue>;
  /** Bytes that the header takes, up to the end of its last block. */
  readonly length: number;
}

export type ReadHeader =
  | { readonly kind: 'header'; readonly header: FitsHeader }
  /** No END yet: more bytes are needed. */
  | { readonly kind: 'incomplete' }
  | { readonly kind: 'no-fits'; readonly reason: string };

function no(reason: string): ReadHeader {
  return { kind: 'no-fits', reason };
}

/** A quoted string that begins at the first quote, and where it ends; two quotes within are one. */
function quoted(text: string): { readonly value: string; readonly end: number } | null {
  let value = '';
  for (let at = 1; at < text.length; at += 1) {
    if (text[at] !== "'") value += text[at] ?? '';
    else if (text[at + 1] === "'") {
      value += "'";
      at += 1;
    } else return { value: value.trimEnd(), end: at + 1 };
  }
  return null;
}

/** The value of a card's field behind `= `; null when it is empty, or of a kind that no keyword here has (complex). */
function valueOf(field: string): FitsValue {
  const text = field.trimStart();
  if (text.startsWith("'")) return quoted(text)?.value ?? null;
  const plain = (text.split('/')[0] ?? '').trim();
  if (plain === 'T') return true;
  if (plain === 'F') return false;
  if (!/^[+-]?(\d+\.?\d*|\.\d+)([ED][+-]?\d+)?$/i.test(plain)) return null;
  return Number(plain.replace(/d/i, 'E'));
}

/** A string that goes on in CONTINUE cards: each part but the last ends in an ampersand. */
function continued(cards: readonly string[], at: number, first: FitsValue): FitsValue {
  let value = first;
  for (let next = at + 1; typeof value === 'string' && value.endsWith('&'); next += 1) {
    const card = cards[next];
    if (card === undefined || !card.startsWith('CONTINUE')) break;
    const more = quoted(card.slice(8).trimStart())?.value;
    if (more === undefined) break;
    value = value.slice(0, -1) + more;
  }
  return value;
}

function keywordOf(card: string): { readonly keyword: string; readonly field: string } | null {
  if (card.startsWith('HIERARCH ')) {
    const equals = card.indexOf('=');
    return equals < 0 ? null : { keyword: card.slice(9, equals).trim(), field: card.slice(equals + 1) };
  }
  if (card.slice(8, 10) !== '= ') return null;
  return { keyword: card.slice(0, 8).trimEnd(), field: card.slice(10) };
}

/** Reads the header that begins at the first of the bytes. `SIMPLE` or `XTENSION` must stand first. */
export function readFitsHeader(bytes: Uint8Array): ReadHeader {
  const head = decoder.decode(bytes.subarray(0, 9));
  if (bytes.length >= 9 && !/^(SIMPLE {2}=|XTENSION=)/.test(head)) {
    return no('is no FITS file: it does not begin with SIMPLE');
  }
  const cards: string[] = [];
  for (let at = 0; at + cardLength <= bytes.length; at += cardLength) {
    const card = decoder.decode(bytes.subarray(at, at + cardLength));
    if (card.trimEnd() === 'END') {
      const length = Math.ceil((at + cardLength) / fitsBlock) * fitsBlock;
      return { kind: 'header', header: { values: valuesOf(cards), length } };
    }
    if (/[^\x20-\x7e]/.test(card)) return no(`has characters in its header that FITS does not allow`);
    cards.push(card);
  }
  return { kind: 'incomplete' };
}

function valuesOf(cards: readonly string[]): ReadonlyMap<string, FitsValue> {
  const values = new Map<string, FitsValue>();
  for (const [at, card] of cards.entries()) {
    const found = keywordOf(card);
    if (found === null || values.has(found.keyword)) continue;
    values.set(found.keyword, continued(cards, at, valueOf(found.field)));
  }
  return values;
}

/** Whether the image's own keywords stand in the extension behind: the first part then holds no data. */
export function hasEmptyData({ values }: FitsHeader): boolean {
  return values.get('NAXIS') === 0;
}
