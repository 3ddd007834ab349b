import 'server-only';
import { oneLine } from './one-line';

/** A part of a letter. Text is plain text: whatever it holds is shown as it is, in both forms. */
export type LetterPart =
  | { readonly kind: 'text'; readonly text: string }
  | { readonly kind: 'facts'; readonly facts: readonly (readonly [label: string, value: string])[] }
  | {
      readonly kind: 'table';
      readonly caption: string;
      readonly head: readonly string[];
      readonly rows: readonly (readonly string[])[];
    }
  | { readonly kind: 'link'; readonly label: string; readonly href: string };

export interface Letter {
  readonly subject: string;
  readonly name: string;
  readonly parts: readonly LetterPart[];
}

export interface RenderedLetter {
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** A letter as plain text and as HTML with the same contents. The HTML names no colour: it takes those of its reader. */
export function renderLetter(letter: Letter): RenderedLetter {
  const name = oneLine(letter.name, 120);
  const subject = oneLine(letter.subject, 200);
  const greeting = `Dear ${name},`;
  const closing = 'Evenfall sent this on its own; an answer reaches nobody.';
  const text = [greeting, ...letter.parts.map(partAsText), closing].join('\n\n');
  const html = [
    '<!doctype html>',
    `<html lang="en-GB"><head><meta charset="utf-8"><title>${escaped(subject)}</title></head>`,
    '<body style="font:15px/1.5 sans-serif;max-width:46em;margin:1em">',
    `<p>${escaped(greeting)}</p>`,
    ...letter.parts.map(partAsHtml),
    `<p style="font-size:13px;border-top:1px solid;padding-top:8px">${escaped(closing)}</p>`,
    '</body></html>',
  ].join('\n');
  return { subject, text: `${text}\n`, html: `${html}\n` };
}

/** Text for HTML, between tags and in quoted attributes. */
export function escaped(text: string): string {
  return visible(text)
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

/** Control characters, line breaks apart, would change how the rest is read. */
const visible = (text: string): string =>
  text.replace(/[^\P{Cc}\n\t]/gu, '\uFFFD').replace(/[\u202A-\u202E\u2066-\u2069]/g, '\uFFFD');

function safeHref(href: string): string {
  const { protocol } = new URL(href);
  if (protocol === 'http:' || protocol === 'https:') return href;
  throw new Error(`A letter links to ${protocol}, which is no web address.`);
}

function partAsText(part: LetterPart): string {
  switch (part.kind) {
    case 'text':
      return wrapped(visible(part.text));
    case 'facts': {
      const width = Math.max(...part.facts.map(([label]) => label.length));
      return part.facts.map(([label, value]) => `${label.padEnd(width)}  ${oneLine(value, 500)}`).join('\n');
    }
    case 'table':
      return [`${part.caption}:`, ...part.rows.map((row) => rowAsText(part.head, row))].join('\n');
    case 'link':
      return `${part.label}:\n${safeHref(part.href)}`;
  }
}

function partAsHtml(part: LetterPart): string {
  switch (part.kind) {
    case 'text':
      return `<p>${escaped(part.text).replaceAll('\n', '<br>')}</p>`;
    case 'facts':
      return table(
        part.facts.map(([label, value]) => `<tr>${cell('th', label)}${cell('td', oneLine(value, 500))}</tr>`),
      );
    case 'table':
      return [
        `<p>${escaped(part.caption)}:</p>`,
        table([
          `<tr>${part.head.map((head) => cell('th', head)).join('')}</tr>`,
          ...part.rows.map((row) => `<tr>${row.map((value) => cell('td', value)).join('')}</tr>`),
        ]),
      ].join('\n');
    case 'link':
      return `<p><a href="${escaped(safeHref(part.href))}" style="color:inherit">${escaped(part.label)}</a></p>`;
  }
}

const table = (rows: readonly string[]): string =>
  `<table style="border-collapse:collapse">\n${rows.join('\n')}\n</table>`;

const cell = (tag: 'td' | 'th', text: string): string =>
  `<${tag} style="text-align:left;vertical-align:top;padding:3px 12px 3px 0;border-bottom:1px solid;font-weight:${tag === 'th' ? 600 : 400}">${escaped(text)}</${tag}>`;

/** A row of a table read as a sentence: columns do not line up in every reader's type. Empty cells are left out. */
function rowAsText(head: readonly string[], row: readonly string[]): string {
  const parts = row.map((value, index) => [head[index] ?? '', oneLine(value, 500)] as const);
  return `- ${parts
    .filter(([, value]) => value !== '')
    .map(([label, value]) => `${label} ${value}`.trim())
    .join('; ')}`;
}

const width = 76;

/** Lines no longer than a mail reader's window, broken at blanks. */
function wrapped(text: string): string {
  return text
    .split('\n')
    .map((line) => {
      const lines: string[] = [];
      let current = '';
      for (const word of line.split(' ')) {
        if (current !== '' && current.length + 1 + word.length > width) {
          lines.push(current);
          current = word;
        } else current = current === '' ? word : `${current} ${word}`;
      }
      return [...lines, current].join('\n');
    })
    .join('\n');
}
