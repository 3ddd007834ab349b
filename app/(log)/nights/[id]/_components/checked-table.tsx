import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { ToneMark } from '@/app/_components/ui/tone-mark';
import type { CheckedLine } from './check-frames';
import type { LineField } from './frame-line';

const shownRows = 200;
const names: Readonly<Record<LineField, string>> = {
  number: 'frame',
  type: 'type',
  object: 'object',
  band: 'band',
  start: 'start',
  exposure: 'exposure',
  comment: 'comment',
  file: 'file',
  programme: 'programme',
  ra: 'right ascension',
  dec: 'declination',
  fwhm: 'FWHM',
  sky: 'sky',
};

/** What each line will be, and what is wrong with it; lines with faults first. */
export function CheckedTable({ lines }: { readonly lines: readonly CheckedLine[] }) {
  const ordered = [
    ...lines.filter(({ input }) => input === null),
    ...lines.filter(({ input }) => input !== null),
  ];
  return (
    <>
      <DataTable
        caption="Frames as they will be logged, those with faults first"
        maxHeight="40dvh"
        head={
          <tr>
            <HeadCell numeric>Line</HeadCell>
            <HeadCell numeric>Frame</HeadCell>
            <HeadCell>Type</HeadCell>
            <HeadCell>Object</HeadCell>
            <HeadCell>Band</HeadCell>
            <HeadCell numeric unit="UTC">
              Start
            </HeadCell>
            <HeadCell numeric unit="s">
              Exposure
            </HeadCell>
            <HeadCell>What is wrong</HeadCell>
          </tr>
        }
      >
        {ordered.slice(0, shownRows).map(({ lineNumber, line, input, faults }) => (
          <Row key={lineNumber}>
            <Cell heading numeric>
              {lineNumber}
            </Cell>
            <Cell numeric>{line.number}</Cell>
            <Cell>{input?.type ?? line.type}</Cell>
            <Cell>{line.object}</Cell>
            <Cell>{input?.band ?? line.band}</Cell>
            <Cell numeric>{input === null ? line.start : input.utc_start.slice(11, 19)}</Cell>
            <Cell numeric>{line.exposure}</Cell>
            <Cell wrap>
              {Object.entries(faults).map(([field, message]) => (
                <span key={field} className="block text-bad">
                  <ToneMark tone="bad" /> {names[field as LineField]} {message}
                </span>
              ))}
            </Cell>
          </Row>
        ))}
      </DataTable>
      {lines.length > shownRows ? (
        <p className="px-3.5 py-1.5 text-small text-ink-2">and {lines.length - shownRows} more lines.</p>
      ) : null}
    </>
  );
}
