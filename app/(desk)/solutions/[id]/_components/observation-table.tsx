'use client';

import type { KeyboardEvent, MouseEvent } from 'react';
import { BandMark } from '@/app/_components/ui/band-mark';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatFixed, formatSigned } from '@/lib/contracts/format-figure';
import type { SolutionObservation } from '@/lib/contracts/api/solution';
import { toggled, type Selection, type SortKey, type Sorting } from './observation-list';

interface ObservationTableProps {
  /** One page of them. */
  readonly rows: readonly SolutionObservation[];
  readonly colourIndex: string | null;
  /** Several nights were solved together: each row says which is its own. */
  readonly hasNights: boolean;
  readonly sorting: Sorting | null;
  readonly onSort: (sorting: Sorting | null) => void;
  readonly selection: Selection;
  readonly onSelect: (selection: Selection) => void;
}

interface Column {
  readonly key: SortKey;
  readonly title: string;
  readonly unit?: string;
  readonly isText?: boolean;
}

const columns = (colourIndex: string | null): readonly Column[] => [
  { key: 'frame', title: 'Frame' },
  { key: 'star', title: 'Star', isText: true },
  { key: 'band', title: 'Band', isText: true },
  { key: 'airmass', title: 'Airmass' },
  { key: 'colour', title: colourIndex ?? 'Colour', unit: 'mag' },
  { key: 'residual', title: 'Residual', unit: 'mag' },
  { key: 'standardised', title: 'In its errors' },
  { key: 'weight', title: 'Weight' },
  { key: 'leverage', title: 'Leverage' },
  { key: 'reason', title: 'Used, or why not', isText: true },
];

/** Upwards first, then downwards, then as it was. */
function nextSorting(key: SortKey, sorting: Sorting | null): Sorting | null {
  if (sorting?.key !== key) return { key, descends: false };
  return sorting.descends ? null : { key, descends: true };
}

function Head({
  colourIndex,
  hasNights,
  sorting,
  onSort,
}: Pick<ObservationTableProps, 'colourIndex' | 'hasNights' | 'sorting' | 'onSort'>) {
  return (
    <tr>
      <HeadCell>
        <span className="sr-only">Selected</span>
      </HeadCell>
      {hasNights ? <HeadCell>Night</HeadCell> : null}
      {columns(colourIndex).map(({ key, title, unit, isText = false }) => {
        const isSorted = sorting?.key === key;
        return (
          <HeadCell
            key={key}
            numeric={!isText}
            unit={unit}
            aria-sort={isSorted ? (sorting.descends ? 'descending' : 'ascending') : undefined}
          >
            <button
              type="button"
              onClick={() => onSort(nextSorting(key, sorting))}
              className="min-h-6 hover:text-ink hover:underline"
            >
              {title}
              {isSorted ? <span aria-hidden="true"> {sorting.descends ? '↓' : '↑'}</span> : null}
            </button>
          </HeadCell>
        );
      })}
    </tr>
  );
}

/** Up and down go from row to row; with Shift they select on the way. */
function onRowKey(event: KeyboardEvent<HTMLElement>): string | null {
  if (event.key !== 'ArrowDown' && event.key !== 'ArrowUp') return null;
  const row = (event.target as HTMLElement).closest('tr');
  const other = event.key === 'ArrowDown' ? row?.nextElementSibling : row?.previousElementSibling;
  const box = other?.querySelector<HTMLInputElement>('input[type="checkbox"]');
  if (box === null || box === undefined) return null;
  event.preventDefault();
  box.focus();
  return event.shiftKey ? box.value : null;
}

/** Observations with what the fit made of them; a click on a row selects it, here and in the plots. */
export function ObservationTable(props: ObservationTableProps) {
  const { rows, colourIndex, hasNights, sorting, onSort, selection, onSelect } = props;
  const select = (event: MouseEvent, id: string) => {
    // The tick box speaks for itself.
    if ((event.target as HTMLElement).closest('label, a, button') !== null) return;
    const adds = event.shiftKey || event.ctrlKey || event.metaKey;
    onSelect(adds ? toggled(selection, id) : new Set(selection.size === 1 && selection.has(id) ? [] : [id]));
  };
  return (
    <div
      onKeyDown={(event) => {
        const passed = onRowKey(event);
        if (passed !== null) onSelect(new Set([...selection, passed]));
      }}
    >
      <DataTable
        caption="Observations of the solution"
        maxHeight="42rem"
        head={<Head {...{ colourIndex, hasNights, sorting, onSort }} />}
      >
        {rows.map((row) => (
          <ObservationRow
            key={row.observation}
            row={row}
            hasNights={hasNights}
            isSelected={selection.has(row.observation)}
            onToggle={() => onSelect(toggled(selection, row.observation))}
            onClick={(event) => select(event, row.observation)}
          />
        ))}
      </DataTable>
    </div>
  );
}

interface ObservationRowProps {
  readonly row: SolutionObservation;
  readonly hasNights: boolean;
  readonly isSelected: boolean;
  readonly onToggle: () => void;
  readonly onClick: (event: MouseEvent) => void;
}

function ObservationRow({ row, hasNights, isSelected, onToggle, onClick }: ObservationRowProps) {
  const { frame, star, band, used } = row;
  return (
    <Row selected={isSelected} onClick={onClick} className={used ? undefined : 'text-ink-2'}>
      <Cell className="w-6 py-0.5">
        <Checkbox
          label={<span className="sr-only">{`Frame ${frame}, star ${star}, ${band}`}</span>}
          value={row.observation}
          checked={isSelected}
          onChange={onToggle}
        />
      </Cell>
      {hasNights ? <Cell mono>{row.night_date}</Cell> : null}
      <Cell numeric>
        {used ? null : (
          <span className="text-bad">
            <span aria-hidden="true">✕ </span>
            <span className="sr-only">rejected </span>
          </span>
        )}
        {frame}
      </Cell>
      <Cell heading>{star}</Cell>
      <Cell>
        <BandMark band={band} hollow={!used} /> {band}
      </Cell>
      <Cell numeric>{formatFixed(row.airmass, 3)}</Cell>
      <Cell numeric>{formatFixed(row.colour, 3)}</Cell>
      <Cell numeric>{formatSigned(row.residual, 3)}</Cell>
      <Cell numeric>{formatSigned(row.standardised, 1)}</Cell>
      <Cell numeric>{formatFixed(row.weight, 2)}</Cell>
      <Cell numeric>{formatFixed(row.leverage, 3)}</Cell>
      <Cell wrap>{standingWords(row)}</Cell>
    </Row>
  );
}

function standingWords({ used, reason, decided_by }: SolutionObservation): string {
  const by = decided_by === null ? '' : `, by ${decided_by}`;
  if (!used) return `${reason === '' ? 'not used' : reason}${by}`;
  return reason === '' && by === '' ? 'used' : `used: ${reason === '' ? 'kept in' : reason}${by}`;
}
