import type { ReactNode } from 'react';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { Panel } from '@/app/_components/ui/panel';
import { problems } from '@/lib/contracts/api/problem';
import { CodeBlock } from './code-block';
import { Prose } from './prose';

/** What holds for every call. */
export function Basics({ address }: { readonly address: string }) {
  const setUp = `export EVENFALL=${address}\nexport TOKEN=evf_…   # made on the account page, or by POST /tokens`;
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] items-start gap-4 lg:grid-cols-2">
      <Panel title="In every call">
        <div className="grid grid-cols-[minmax(0,1fr)] gap-3">
          <CodeBlock label="Setting the address and the token" code={setUp} />
          <dl className="grid gap-2.5">
            <Basic term="Who you are">
              A token in <code>Authorization: Bearer TOKEN</code>, or the browser’s session. A token can do
              what its owner can, or only read. Calls marked “open” need neither.
            </Basic>
            <Basic term="Times and units">
              Instants are ISO 8601 in UTC with <code>Z</code>. Angles are degrees, hour angles hours,
              exposures seconds, magnitudes mag.
            </Basic>
            <Basic term="Lists">
              Come as <code>{'{items, next}'}</code>. Send <code>next</code> as <code>after</code> for the
              page that follows; at the end it is null. <code>limit</code> goes up to 1,000.
            </Basic>
            <Basic term="Sending a write again">
              Give a write an <code>Idempotency-Key</code> of your own, such as a UUID. Sent again within two
              days with the same key, it is not done again: you get the first answer.
            </Basic>
            <Basic term="What you may not see">
              Is answered as if it were not there. Investigators see the nights with frames of their
              programmes, and of those their own frames and the calibration and standard frames that belong to
              no programme.
            </Basic>
          </dl>
        </div>
      </Panel>
      <Panel title="Problems" note="application/problem+json, RFC 9457" flush>
        <DataTable
          caption="Problems by status"
          head={
            <tr>
              <HeadCell numeric>Status</HeadCell>
              <HeadCell>Problem</HeadCell>
              <HeadCell>What it means</HeadCell>
            </tr>
          }
        >
          {Object.entries(problems).map(([code, { status, title, meaning }]) => (
            <Row key={code} id={`problem-${code}`}>
              <Cell numeric>{status}</Cell>
              <Cell wrap heading>
                {title}
              </Cell>
              <Cell wrap className="text-ink-2">
                <Prose text={meaning} />
              </Cell>
            </Row>
          ))}
        </DataTable>
      </Panel>
    </div>
  );
}

function Basic({ term, children }: { readonly term: string; readonly children: ReactNode }) {
  return (
    <div>
      <dt className="font-medium">{term}</dt>
      <dd className="max-w-prose text-ink-2 [&_code]:text-small [&_code]:text-ink">{children}</dd>
    </div>
  );
}
