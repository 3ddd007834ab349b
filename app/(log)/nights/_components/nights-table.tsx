import type { Route } from 'next';
import Link from 'next/link';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatDateInWords, formatDuration } from '@/app/_components/ui/format-time';
import { StateTag } from '@/app/_components/ui/state-tag';
import type { Night } from '@/lib/contracts/api/night';

export function NightsTable({ nights }: { readonly nights: readonly Night[] }) {
  return (
    <DataTable
      caption="Nights, the latest first"
      head={
        <tr>
          <HeadCell>Night</HeadCell>
          <HeadCell>Telescope</HeadCell>
          <HeadCell>State</HeadCell>
          <HeadCell>Observers</HeadCell>
          <HeadCell numeric>Frames</HeadCell>
          <HeadCell numeric>Time lost</HeadCell>
          <HeadCell>Account</HeadCell>
        </tr>
      }
    >
      {nights.map((night) => (
        <Row key={night.id}>
          <Cell heading>
            <Link href={`/nights/${night.id}` as Route}>{formatDateInWords(night.date)}</Link>
          </Cell>
          <Cell>{night.telescope}</Cell>
          <Cell>
            <StateTag state={night.state} />
          </Cell>
          <Cell>{night.observers.map(({ name }) => name).join(', ')}</Cell>
          <Cell numeric>{night.frames}</Cell>
          <Cell numeric>{night.minutes_lost === 0 ? '' : formatDuration(night.minutes_lost)}</Cell>
          <Cell wrap>
            <span className="line-clamp-2">{night.summary}</span>
          </Cell>
        </Row>
      ))}
    </DataTable>
  );
}
