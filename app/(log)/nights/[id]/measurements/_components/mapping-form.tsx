'use client';

import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { Finding } from '@/app/_components/ui/finding';
import { Select } from '@/app/_components/ui/select';
import {
  columnPositions,
  measurementColumns,
  missingColumns,
  type ColumnMapping,
  type MeasurementColumn,
} from '@/lib/contracts/measurement-columns';
import type { TableHead } from './read-head';

interface MappingFormProps {
  readonly head: TableHead;
  readonly mapping: ColumnMapping;
  readonly telescope: string;
  readonly isRemembered: boolean;
  readonly onMapping: (mapping: ColumnMapping) => void;
  readonly onRemember: (remember: boolean) => void;
}

/** Columns that nearly every table has; the others come after them. */
const first: ReadonlySet<MeasurementColumn> = new Set<MeasurementColumn>([
  'frame',
  'star',
  'ra',
  'dec',
  'inst_mag',
  'inst_err',
  'flux',
  'flux_err',
]);

/** Which column of the file is which: each with its meaning, a choice among the file's headers, and the first values under it. */
export function MappingForm(props: MappingFormProps) {
  const { head, mapping, telescope, isRemembered, onMapping, onRemember } = props;
  const positions = columnPositions(head.headers, mapping);
  const missing = missingColumns(positions);
  return (
    <section aria-label="Columns of the file" className="grid grid-cols-1 gap-3">
      <p className="max-w-prose">
        Say which column of the file is which. The names that a table should have stand on the left; a file
        that uses them needs nothing here.
      </p>
      <ul aria-live="polite" className="grid gap-2">
        {missing.map(({ message, anyOf }) => (
          <li key={message}>
            <Finding tone="warn" word="Missing">
              {message} Choose one for {anyOf.map((columns) => columns.join(' and ')).join(', or ')}.
            </Finding>
          </li>
        ))}
        {missing.length === 0 ? (
          <li>
            <Finding tone="good" word="Complete">
              Every column that is needed has been found.
            </Finding>
          </li>
        ) : null}
      </ul>
      <MappingTable {...{ head, mapping, positions, onMapping }} only={first} caption="Main columns" />
      <details>
        <summary className="mb-2 cursor-pointer text-table underline underline-offset-2">
          Further columns: detector, flags, exposures of frames that the log lacks
        </summary>
        <MappingTable {...{ head, mapping, positions, onMapping }} only={null} caption="Further columns" />
      </details>
      <Checkbox
        label={`Remember this for tables of ${telescope} with these headers`}
        checked={isRemembered}
        onChange={(event) => onRemember(event.target.checked)}
      />
    </section>
  );
}

interface MappingTableProps extends Pick<MappingFormProps, 'head' | 'mapping' | 'onMapping'> {
  readonly positions: ReadonlyMap<MeasurementColumn, number>;
  readonly only: ReadonlySet<MeasurementColumn> | null;
  readonly caption: string;
}

function MappingTable({ head, mapping, positions, onMapping, only, caption }: MappingTableProps) {
  const columns = measurementColumns.filter(({ name }) => (only ?? first).has(name) === (only !== null));
  const choose = (column: MeasurementColumn, header: string) => {
    const { [column]: _former, ...others } = mapping;
    onMapping(header === '' ? others : { ...others, [column]: header });
  };
  return (
    <DataTable
      caption={caption}
      head={
        <Row>
          <HeadCell>Column</HeadCell>
          <HeadCell>In the file</HeadCell>
          <HeadCell>First values</HeadCell>
          <HeadCell>Meaning</HeadCell>
        </Row>
      }
    >
      {columns.map(({ name, unit, meaning }) => {
        const position = positions.get(name);
        return (
          <Row key={name}>
            <Cell heading mono>
              {name}
              {unit === '' ? null : <small className="block font-sans text-fine text-ink-2">{unit}</small>}
            </Cell>
            <Cell className="min-w-44">
              <Select
                aria-label={`${name} in the file`}
                value={position === undefined ? '' : (head.headers[position] ?? '')}
                onChange={(event) => choose(name, event.target.value)}
              >
                <option value="">not in the file</option>
                {[...new Set(head.headers.filter((header) => header !== ''))].map((header) => (
                  <option key={header} value={header}>
                    {header}
                  </option>
                ))}
              </Select>
            </Cell>
            <Cell mono className="max-w-72 truncate">
              {position === undefined ? '' : head.rows.map((row) => row[position]?.trim() ?? '').join(', ')}
            </Cell>
            <Cell wrap className="text-ink-2">
              {meaning}
            </Cell>
          </Row>
        );
      })}
    </DataTable>
  );
}
