/** What a file is by its first bytes, where it is plainly no text table; null when it may be one. */
export function foreignFileKind(head: Uint8Array): string | null {
  const starts = (...bytes: readonly number[]): boolean => bytes.every((byte, at) => head[at] === byte);
  if (starts(0x1f, 0x8b)) return 'a gzip-compressed file';
  if (starts(0x42, 0x5a, 0x68)) return 'a bzip2-compressed file';
  if (starts(0xfd, 0x37, 0x7a, 0x58, 0x5a)) return 'an xz-compressed file';
  if (starts(0x50, 0x4b, 0x03, 0x04)) return 'a zip archive or a spreadsheet’s own format';
  if (starts(0xd0, 0xcf, 0x11, 0xe0)) return 'an old spreadsheet’s own format';
  if (starts(0x25, 0x50, 0x44, 0x46)) return 'a PDF document';
  if (starts(...Buffer.from('SIMPLE  =', 'latin1'))) return 'a FITS file';
  if (starts(0xff, 0xfe) || starts(0xfe, 0xff)) return 'text in UTF-16';
  if (starts(...Buffer.from('<?xml', 'latin1')) || starts(...Buffer.from('<!DOCTYPE', 'latin1'))) {
    return 'a document in XML or HTML';
  }
  return null;
}
