import type { Metadata } from 'next';
import { formatInstant } from '@/app/_components/ui/format-time';
import { KeyValues } from '@/app/_components/ui/key-values';
import { LinkButton } from '@/app/_components/ui/link-button';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { readCaughtMail } from '@/lib/server/reads/caught-mail';

export const metadata: Metadata = { title: 'Mail' };

/** Mail need not hold any of its headers; an empty place would look like a fault of the page. */
const given = (header: string): string => (header === '' ? 'not given' : header);

export default async function MessagePage({ params }: PageProps<'/mail/[id]'>) {
  const caller = await callerOrSignIn();
  const mail = await orNotFound(readCaughtMail(caller, (await params).id));
  return (
    <>
      <PageHead
        title={mail.subject === '' ? 'no subject' : mail.subject}
        actions={<LinkButton href="/mail">All mail</LinkButton>}
      />
      <div className="grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_minmax(320px,30%)]">
        <div className="grid gap-5">
          <Panel title="Plain text">
            {mail.text.trim() === '' ? (
              <p className="text-ink-2">The message has no text.</p>
            ) : (
              <pre className="max-w-prose text-table wrap-anywhere whitespace-pre-wrap">{mail.text}</pre>
            )}
          </Panel>
          {mail.html === null ? null : (
            <>
              {/* The browser draws it on white: folded, so that it lights up no dim room by itself, and never in Dark site. */}
              <details className="rounded-panel border border-rule bg-sheet px-3.5 py-2.5 dark-site:hidden">
                <summary className="text-table font-semibold">As HTML</summary>
                <iframe
                  title="The message as HTML"
                  sandbox=""
                  srcDoc={mail.html}
                  className="mt-2 h-[32rem] w-full border border-rule"
                />
              </details>
              <p className="hidden text-small text-ink-2 dark-site:block">
                The message has an HTML form, too. It is white, so Dark site leaves it out.
              </p>
            </>
          )}
        </div>
        <Panel title="Headers">
          <KeyValues
            items={[
              { key: 'From', value: given(mail.from) },
              { key: 'To', value: given(mail.to) },
              { key: 'Received', value: formatInstant(mail.receivedAt), figure: true },
              { key: 'Message-ID', value: given(mail.messageId), figure: true },
            ]}
          />
          <details className="mt-3">
            <summary className="text-small underline">As received</summary>
            <pre className="mt-2 max-h-96 overflow-auto text-small whitespace-pre-wrap">
              {mail.headers.join('\n')}
            </pre>
          </details>
        </Panel>
      </div>
    </>
  );
}
