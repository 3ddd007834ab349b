import type { Route } from 'next';
import Link from 'next/link';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatClock, formatDateInWords, formatIsoDate } from '@/app/_components/ui/format-time';
import type { AuditRow } from '@/lib/contracts/audit';
import { ValueChanges } from './value-changes';

export function AuditTable({ rows }: { readonly rows: readonly AuditRow[] }) {
  return (
    <DataTable
      caption="Audit trail, the latest first"
      head={
        <tr>
          <HeadCell unit="UTC">When</HeadCell>
          <HeadCell>Who</HeadCell>
          <HeadCell>What</HeadCell>
          <HeadCell>Night, programme</HeadCell>
          <HeadCell>Before → after</HeadCell>
          <HeadCell>Reason</HeadCell>
        </tr>
      }
    >
      {rows.map((row) => (
        <Row key={row.id} className="align-top">
          <Cell mono>
            {formatIsoDate(row.utc)} {formatClock(row.utc)}
          </Cell>
          <Cell>{row.person ?? <span className="text-ink-2">the service</span>}</Cell>
          <Cell>
            <span className="font-mono">{row.act}</span>
            <span className="block text-small text-ink-2">
              <Link
                href={`/audit?subject=${encodeURIComponent(row.subjectId)}` as Route}
                className="underline"
              >
                {row.subjectKind.replaceAll('-', ' ')} {row.subjectId}
              </Link>
            </span>
          </Cell>
          <Cell>
            {row.night === null || row.nightDate === null ? null : (
              <Link href={`/nights/${row.night}` as Route} className="underline">
                {formatDateInWords(row.nightDate)}
              </Link>
            )}
            {row.programme === null ? null : <span className="block font-mono">{row.programme}</span>}
          </Cell>
          <Cell wrap>
            <ValueChanges before={row.before} after={row.after} />
          </Cell>
          <Cell wrap>{row.reason}</Cell>
        </Row>
      ))}
    </DataTable>
  );
}
