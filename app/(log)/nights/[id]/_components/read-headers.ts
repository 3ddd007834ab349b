import { fitsBlock, hasEmptyData, readFitsHeader, type FitsValue } from '@/lib/formats/fits-header';

/** Longer headers than this are no headers. */
const most = 400 * fitsBlock;
const step = 10 * fitsBlock;

export type HeaderOfFile =
  | { readonly ok: true; readonly file: string; readonly values: ReadonlyMap<string, FitsValue> }
  | { readonly ok: false; readonly file: string; readonly reason: string };

/** The first bytes of a file, unpacked if it is packed; the rest stays where it is. */
async function firstBytes(file: File, length: number): Promise<Uint8Array> {
  if (!/\.gz$/i.test(file.name)) return new Uint8Array(await file.slice(0, length).arrayBuffer());
  const reader = file.stream().pipeThrough(new DecompressionStream('gzip')).getReader();
  const parts: Uint8Array[] = [];
  let size = 0;
  while (size < length) {
    const { done, value } = await reader.read();
    if (done) break;
    parts.push(value);
    size += value.length;
  }
  await reader.cancel();
  const bytes = new Uint8Array(size);
  let at = 0;
  for (const part of parts) {
    bytes.set(part, at);
    at += part.length;
  }
  return bytes.subarray(0, length);
}

/** The keywords of a FITS file: of its first part, and of the one behind where the first holds no image. */
async function headerOf(file: File): Promise<HeaderOfFile> {
  const no = (reason: string): HeaderOfFile => ({ ok: false, file: file.name, reason });
  for (let length = step; ; length += step) {
    const bytes = await firstBytes(file, length);
    const primary = readFitsHeader(bytes);
    if (primary.kind === 'no-fits') return no(primary.reason);
    const isWhole = bytes.length < length || length >= most;
    if (primary.kind === 'incomplete') {
      if (isWhole) return no('has a header without an end');
      continue;
    }
    const { header } = primary;
    if (!hasEmptyData(header) || bytes.length <= header.length) {
      if (hasEmptyData(header) && !isWhole) continue;
      return { ok: true, file: file.name, values: header.values };
    }
    const extension = readFitsHeader(bytes.subarray(header.length));
    if (extension.kind === 'incomplete' && !isWhole) continue;
    const more = extension.kind === 'header' ? extension.header.values : [];
    return { ok: true, file: file.name, values: new Map([...more, ...header.values]) };
  }
}

/** The headers of many files, one file after the other: a night has a thousand of them. */
export async function readHeaders(
  files: readonly File[],
  onProgress: (done: number) => void,
): Promise<readonly HeaderOfFile[]> {
  const headers: HeaderOfFile[] = [];
  for (const file of files) {
    try {
      headers.push(await headerOf(file));
    } catch {
      // The file went away, or is packed in another way than its name says: the list says which.
      headers.push({ ok: false, file: file.name, reason: 'cannot be read' });
    }
    onProgress(headers.length);
  }
  return headers;
}
