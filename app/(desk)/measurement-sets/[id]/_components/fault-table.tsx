import { buttonClass } from '@/app/_components/ui/button';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatCount, noValue } from '@/lib/contracts/format-figure';
import { Pagination } from '@/app/_components/ui/pagination';
import { Panel } from '@/app/_components/ui/panel';
import type { MeasurementFault, MeasurementSet } from '@/lib/contracts/api/measurement-set';
import type { PageLinks } from './page-links';

/** How many faults of a table are kept word for word. */
const kept = 1000;

interface FaultTableProps {
  readonly set: MeasurementSet;
  readonly faults: readonly MeasurementFault[];
  readonly links: PageLinks;
}

/** What was wrong with the table: each fault with its place in the file, and what to do about it. */
export function FaultTable({ set, faults, links }: FaultTableProps) {
  const note =
    set.faults > kept
      ? `the first ${formatCount(kept)} of ${formatCount(set.faults)}, in the order of the file`
      : 'in the order of the file';
  return (
    <Panel
      title={set.faults === 0 ? 'Why it was taken back' : 'Faults'}
      note={set.faults === 0 ? undefined : note}
      actions={
        set.faults === 0 ? null : (
          <a href={`/api/v1/measurement-sets/${set.id}/faults?format=csv`} download className={buttonClass()}>
            Download as CSV
          </a>
        )
      }
      flush
    >
      <DataTable caption="Faults of the table" head={<Head />}>
        {faults.map((fault, index) => (
          <Row key={index}>
            <Cell numeric>{fault.line === null ? noValue : fault.line}</Cell>
            <Cell mono>{fault.column ?? noValue}</Cell>
            <Cell mono wrap className="max-w-72 wrap-anywhere">
              {fault.value === null ? (
                noValue
              ) : fault.value === '' ? (
                <span className="font-sans text-ink-2">nothing</span>
              ) : (
                fault.value
              )}
            </Cell>
            <Cell wrap>{fault.message}</Cell>
            <Cell wrap className="text-ink-2">
              {fault.remedy}
            </Cell>
          </Row>
        ))}
      </DataTable>
      <Pagination noun="faults" {...links} />
    </Panel>
  );
}

function Head() {
  return (
    <Row>
      <HeadCell numeric>Line</HeadCell>
      <HeadCell>Column</HeadCell>
      <HeadCell>Value</HeadCell>
      <HeadCell>What is wrong</HeadCell>
      <HeadCell>What to do</HeadCell>
    </Row>
  );
}
