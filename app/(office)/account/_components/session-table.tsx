import { ActButton } from '@/app/_components/ui/act-button';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatInstant } from '@/app/_components/ui/format-time';
import { browserName } from '@/lib/contracts/browser-name';
import { endSessionAction } from '../actions';

export interface SessionLine {
  readonly session: string;
  readonly userAgent: string;
  readonly createdAt: string;
  readonly expiresAt: string;
  readonly isThis: boolean;
}

export function SessionTable({ sessions }: { readonly sessions: readonly SessionLine[] }) {
  return (
    <DataTable
      caption="Your sessions"
      head={
        <tr>
          <HeadCell>Browser</HeadCell>
          <HeadCell>Signed in</HeadCell>
          <HeadCell>Ends unless used</HeadCell>
          <HeadCell>
            <span className="sr-only">Sign out</span>
          </HeadCell>
        </tr>
      }
    >
      {sessions.map((session) => (
        <Row key={session.session}>
          <Cell heading>{browserName(session.userAgent)}</Cell>
          <Cell mono>{formatInstant(session.createdAt)}</Cell>
          <Cell mono>{formatInstant(session.expiresAt)}</Cell>
          <Cell>
            {session.isThis ? (
              'this one'
            ) : (
              <ActButton
                action={endSessionAction}
                values={{ session: session.session }}
                label={`Sign out ${browserName(session.userAgent)}, signed in ${formatInstant(session.createdAt)}`}
              >
                Sign out
              </ActButton>
            )}
          </Cell>
        </Row>
      ))}
    </DataTable>
  );
}
