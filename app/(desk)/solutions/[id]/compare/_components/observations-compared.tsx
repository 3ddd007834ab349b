'use client';

import { useMemo } from 'react';
import { useObservations } from '@/app/_components/solutions/use-observations';
import { BandMark } from '@/app/_components/ui/band-mark';
import { Button } from '@/app/_components/ui/button';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { formatCount, formatSigned } from '@/lib/contracts/format-figure';
import { Panel } from '@/app/_components/ui/panel';
import type { Solution, SolutionObservation } from '@/lib/contracts/api/solution';
import { differences, type Difference } from './compared-observations';

interface ObservationsComparedProps {
  readonly one: Pick<Solution, 'id' | 'number'>;
  readonly other: Pick<Solution, 'id' | 'number'>;
}

/** Rows drawn; more differ only where the two have little in common. */
const mostRows = 500;

/** Observations that only one of two solutions used, with what each says of them. */
export function ObservationsCompared({ one, other }: ObservationsComparedProps) {
  const first = useObservations(one.id);
  const second = useObservations(other.id);
  const rows = useMemo(() => differences(first.items, second.items), [first.items, second.items]);
  const isWhole = first.standing === 'whole' && second.standing === 'whole';
  const broken = [first, second].find(({ standing }) => standing === 'broken off');
  return (
    <Panel
      title="Observations that differ"
      note={
        isWhole
          ? `${formatCount(rows.length)} ${rows.length === 1 ? 'is' : 'are'} used by one only`
          : undefined
      }
      flush
    >
      {broken === undefined ? null : (
        <div className="p-3.5">
          <ErrorNotice
            fault={{ detail: 'Some observations could not be read.' }}
            action={<Button onClick={broken.again}>Try again</Button>}
          />
        </div>
      )}
      {isWhole ? null : broken === undefined ? (
        <p role="status" className="px-3.5 py-3 text-ink-2">
          The observations are being read …
        </p>
      ) : null}
      {isWhole && rows.length === 0 ? (
        <EmptyState title="None differ">Both solutions used and rejected the same observations.</EmptyState>
      ) : null}
      {isWhole && rows.length > 0 ? <Differences one={one} other={other} rows={rows} /> : null}
    </Panel>
  );
}

function Differences({
  one,
  other,
  rows,
}: ObservationsComparedProps & { readonly rows: readonly Difference[] }) {
  return (
    <>
      <DataTable
        caption="Observations that differ"
        maxHeight="42rem"
        head={
          <tr>
            <HeadCell numeric>Frame</HeadCell>
            <HeadCell>Star</HeadCell>
            <HeadCell>Band</HeadCell>
            <HeadCell numeric unit="mag">
              Residual, {one.number}
            </HeadCell>
            <HeadCell numeric unit="mag">
              Residual, {other.number}
            </HeadCell>
            <HeadCell>Solution {one.number}</HeadCell>
            <HeadCell>Solution {other.number}</HeadCell>
          </tr>
        }
      >
        {rows.slice(0, mostRows).map((row) => (
          <DifferenceRow key={row.id} row={row} />
        ))}
      </DataTable>
      {rows.length > mostRows ? (
        <p className="px-3.5 py-3 text-small text-ink-2">
          The first {formatCount(mostRows)} of {formatCount(rows.length)}.
        </p>
      ) : null}
    </>
  );
}

function DifferenceRow({ row: { one, other } }: { readonly row: Difference }) {
  const known = one ?? other;
  if (known === null) return null;
  return (
    <Row>
      <Cell numeric>{known.frame}</Cell>
      <Cell heading>{known.star}</Cell>
      <Cell>
        <BandMark band={known.band} /> {known.band}
      </Cell>
      <Cell numeric>{formatSigned(one?.residual, 3)}</Cell>
      <Cell numeric>{formatSigned(other?.residual, 3)}</Cell>
      <Cell wrap>{standing(one)}</Cell>
      <Cell wrap>{standing(other)}</Cell>
    </Row>
  );
}

function standing(observation: SolutionObservation | null): string {
  if (observation === null) return 'not among its observations';
  if (observation.used) return 'used';
  return observation.reason === '' ? 'rejected' : `rejected: ${observation.reason}`;
}
