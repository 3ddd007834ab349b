import type { Metadata, Route } from 'next';
import Link from 'next/link';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatInstant } from '@/app/_components/ui/format-time';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { caughtMails } from '@/lib/server/reads/caught-mail';

export const metadata: Metadata = { title: 'Mail' };

export default async function MailPage() {
  const caller = await callerOrSignIn();
  const { mails, total } = await orNotFound(caughtMails(caller));
  return (
    <>
      <PageHead title="Mail">
        <span className="text-ink-2">
          What the demo sent. It goes no further than this machine.
          {mails.length < total ? ` Listed are the newest ${mails.length} of ${total}.` : null}
        </span>
      </PageHead>
      <Panel flush>
        {mails.length === 0 ? (
          <EmptyState title="No mail yet">
            Mail is sent when an upload is refused, when measurements or a proposal wait, when a night is
            calibrated, and when somebody is invited.
          </EmptyState>
        ) : (
          <DataTable
            caption="Mail, the newest first"
            head={
              <tr>
                <HeadCell>Subject</HeadCell>
                <HeadCell>To</HeadCell>
                <HeadCell>Received</HeadCell>
              </tr>
            }
          >
            {mails.map((mail) => (
              <Row key={mail.id}>
                <Cell heading className="min-w-52 whitespace-normal!">
                  <Link href={`/mail/${mail.id}` as Route} className="underline">
                    {mail.subject === '' ? 'no subject' : mail.subject}
                  </Link>
                </Cell>
                <Cell>{mail.to === '' ? 'not given' : mail.to}</Cell>
                <Cell mono>{formatInstant(mail.receivedAt)}</Cell>
              </Row>
            ))}
          </DataTable>
        )}
      </Panel>
    </>
  );
}
