import 'server-only';

/** Text fit for a mail's header: no line breaks or other control characters, which could begin a header of their own. */
export function oneLine(text: string, limit: number): string {
  const line = text
    .replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ')
    .replace(/\s+/g, ' ')
    .trim();
  return line.length <= limit ? line : `${line.slice(0, limit - 1).trimEnd()}…`;
}
