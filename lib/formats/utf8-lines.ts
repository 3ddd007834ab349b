import { isAscii, isUtf8 } from 'node:buffer';

/** Text of whole lines, their ends made LF. */
export interface TextPiece {
  readonly text: string;
  /** Lines of the piece that are not UTF-8, from 0; what cannot be read in them is U+FFFD. */
  readonly wrongLines: readonly number[];
}

export interface Utf8Lines {
  /** Takes the next bytes, which may be overwritten afterwards; gives the lines that they complete, or null. */
  readonly push: (bytes: Uint8Array) => TextPiece | null;
  /** The last line, which nothing ends. */
  readonly end: () => TextPiece;
  /** Bytes that wait for the end of their line. */
  readonly pending: () => number;
}

/** Decodes UTF-8 in pieces that end at a line feed, which is no part of any longer sequence. Drops a byte-order mark. */
export function utf8Lines(): Utf8Lines {
  let rest = Buffer.alloc(0);
  let atStart = true;

  function decode(bytes: Buffer): TextPiece {
    const ascii = isAscii(bytes);
    const wrongLines = ascii || isUtf8(bytes) ? [] : findWrongLines(bytes);
    let text = bytes.toString(ascii ? 'latin1' : 'utf8');
    if (atStart && text.startsWith('\ufeff')) text = text.slice(1);
    atStart &&= bytes.length === 0;
    return { text: text.includes('\r') ? text.replaceAll('\r\n', '\n') : text, wrongLines };
  }

  return {
    push: (bytes) => {
      const end = bytes.lastIndexOf(10) + 1;
      const whole = Buffer.from(bytes.buffer, bytes.byteOffset, end);
      const before = rest;
      if (end === 0) {
        rest = Buffer.concat([before, bytes]);
        return null;
      }
      rest = Buffer.from(bytes.subarray(end));
      return decode(before.length === 0 ? whole : Buffer.concat([before, whole]));
    },
    end: () => decode(rest),
    pending: () => rest.length,
  };
}

function findWrongLines(bytes: Buffer): readonly number[] {
  const wrong: number[] = [];
  let from = 0;
  for (let line = 0; from < bytes.length; line += 1) {
    const feed = bytes.indexOf(10, from);
    const to = feed === -1 ? bytes.length : feed + 1;
    if (!isUtf8(bytes.subarray(from, to))) wrong.push(line);
    from = to;
  }
  return wrong;
}
