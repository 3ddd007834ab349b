import 'server-only';
import type { Issue } from '@/lib/faults/fault';
import { renderLetter, type RenderedLetter } from './letter';

export interface UploadRefused {
  readonly name: string;
  /** The night in words: `3 November 2026, Larkspur 0.8 m`. */
  readonly night: string;
  readonly fileName: string;
  readonly nFaults: number;
  /** The first of them; five are told. */
  readonly faults: readonly Issue[];
  /** The set's page. */
  readonly href: string;
}

const told = 5;

/** To whoever uploaded a table that was refused. */
export function uploadRefusedMail(
  upload: UploadRefused,
): RenderedLetter & { readonly kind: 'upload-refused' } {
  const { nFaults } = upload;
  const count = nFaults === 1 ? 'One fault was' : `${nFaults.toLocaleString('en-GB')} faults were`;
  const letter = renderLetter({
    subject: `Refused: ${upload.fileName} (${nFaults === 1 ? '1 fault' : `${nFaults.toLocaleString('en-GB')} faults`})`,
    name: upload.name,
    parts: [
      {
        kind: 'text',
        text: `The measurement table that you uploaded was refused. ${count} found, and nothing of it was taken. Mend the table and upload it again.`,
      },
      {
        kind: 'facts',
        facts: [
          ['Night', upload.night],
          ['File', upload.fileName],
        ],
      },
      {
        kind: 'table',
        caption: nFaults > told ? `The first ${told} faults` : 'The faults',
        head: ['Line', 'Column', 'Value', 'Fault'],
        rows: upload.faults.slice(0, told).map(faultRow),
      },
      { kind: 'link', label: 'All faults, on a page and as a table to download', href: upload.href },
    ],
  });
  return { kind: 'upload-refused', ...letter };
}

function faultRow({ line, column, path, value, message, remedy }: Issue): readonly string[] {
  const reason = remedy === undefined || remedy === '' ? message : `${message}. ${remedy}`;
  return [line === undefined ? '' : String(line), column ?? path, value ?? '', reason];
}
