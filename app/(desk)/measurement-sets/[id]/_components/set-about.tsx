import { BandMark } from '@/app/_components/ui/band-mark';
import { formatBytes, formatCount, formatPlain } from '@/lib/contracts/format-figure';
import { formatInstant } from '@/app/_components/ui/format-time';
import { KeyValues, type KeyValue } from '@/app/_components/ui/key-values';
import { Panel } from '@/app/_components/ui/panel';
import type { MeasurementSet } from '@/lib/contracts/api/measurement-set';
import type { SetPage } from '@/lib/contracts/set-page';

/** Where the set came from, and how it was read. */
export function SetAbout({ page: { set, summary } }: { readonly page: SetPage }) {
  const mapping = Object.entries(set.mapping).filter(([column, header]) => column !== header.toLowerCase());
  return (
    <aside className="grid min-w-0 grid-cols-1 content-start gap-5">
      <Panel title="Where it came from">
        <KeyValues items={origin(set)} />
        <p className="mt-3 text-small text-ink-2">SHA-256 of the original, kept byte for byte</p>
        <p className="font-mono text-small wrap-anywhere">{set.sha256}</p>
      </Panel>
      {summary.frames.length === 0 ? null : (
        <Panel title="Frames" note={`${formatCount(summary.frames.length)}, with their rows`}>
          <ul
            className="grid max-h-72 grid-cols-2 gap-x-5 overflow-auto text-table"
            tabIndex={0}
            aria-label="Frames and their rows"
          >
            {summary.frames.map(({ number, band, nRows }) => (
              <li key={number} className="flex justify-between gap-2">
                <span>
                  {band === null ? null : <BandMark band={band} />} {band}{' '}
                  <span className="font-mono">{number}</span>
                </span>
                <span className="font-mono text-ink-2">{formatCount(nRows)}</span>
              </li>
            ))}
          </ul>
        </Panel>
      )}
      {mapping.length === 0 ? null : (
        <Panel title="Columns" note="as they were read">
          <KeyValues
            items={mapping.map(([column, header]) => ({ key: column, value: header, figure: true }))}
          />
        </Panel>
      )}
      {set.comments === '' ? null : (
        <Panel title="Comments in the file">
          <pre className="max-h-72 overflow-auto font-mono text-small wrap-anywhere whitespace-pre-wrap">
            {set.comments}
          </pre>
        </Panel>
      )}
    </aside>
  );
}

function origin(set: MeasurementSet): readonly KeyValue[] {
  const items: (KeyValue | null)[] = [
    set.file_name === null ? null : { key: 'File', value: set.file_name, figure: true },
    { key: 'Size', value: formatBytes(set.size), figure: true },
    { key: 'Uploaded', value: formatInstant(set.uploaded_at) },
    { key: 'by', value: set.uploaded_by },
    set.checked_at === null ? null : { key: 'Checked', value: formatInstant(set.checked_at) },
    { key: 'Tolerance', value: `${formatPlain(set.tolerance)}″`, figure: true },
    set.rows === null ? null : { key: 'Rows', value: formatCount(set.rows), figure: true },
    set.frames_created === 0
      ? null
      : { key: 'Frames brought into the log', value: formatCount(set.frames_created), figure: true },
  ];
  return items.filter((item) => item !== null);
}
