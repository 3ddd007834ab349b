import 'server-only';

/**
 * Text of one line, fit for a mail's header: no line breaks or other control characters, which could begin a header of
 * their own, and no marks that turn the direction of what follows.
 */
export function oneLine(text: string, limit: number): string {
  const line = text
    .replace(/[\p{Cc}\p{Zl}\p{Zp}\u202A-\u202E\u2066-\u2069]+/gu, ' ')
    .replace(/\s+/g, ' ')
    .trim();
  return line.length <= limit ? line : `${line.slice(0, limit - 1).trimEnd()}…`;
}
