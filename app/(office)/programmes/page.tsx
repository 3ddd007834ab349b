import type { Metadata, Route } from 'next';
import Link from 'next/link';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { StateTag } from '@/app/_components/ui/state-tag';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { programmeList, type ProgrammeListed } from '@/lib/server/reads/programme-page';
import { CreateForm } from './_components/create-form';

export const metadata: Metadata = { title: 'Programmes' };

export default async function ProgrammesPage() {
  const caller = await callerOrSignIn();
  const { programmes, mayManage } = await programmeList(caller);
  return (
    <>
      <PageHead title="Programmes">
        <span className="text-ink-2">Awarded observing proposals. A programme’s data are its members’.</span>
      </PageHead>
      <div
        className={
          mayManage ? 'grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_minmax(320px,24%)]' : undefined
        }
      >
        <Panel title="Programmes" note={`${programmes.length}`} flush>
          {programmes.length === 0 ? (
            <EmptyState title="No programmes yet">
              {mayManage
                ? 'A programme holds its investigators and targets, and decides who sees its data. Add the first one here.'
                : 'Programmes that name you as an investigator appear here. The observatory’s manager adds you.'}
            </EmptyState>
          ) : (
            <ProgrammeTable programmes={programmes} />
          )}
        </Panel>
        {mayManage ? (
          <Panel title="Add a programme">
            <CreateForm />
          </Panel>
        ) : null}
      </div>
    </>
  );
}

function ProgrammeTable({ programmes }: { readonly programmes: readonly ProgrammeListed[] }) {
  return (
    <DataTable
      caption="Programmes"
      head={
        <tr>
          <HeadCell>Code</HeadCell>
          <HeadCell>Title</HeadCell>
          <HeadCell>Principal investigator</HeadCell>
          <HeadCell numeric>Targets</HeadCell>
          <HeadCell numeric>Nights</HeadCell>
          <HeadCell>Proprietary until</HeadCell>
        </tr>
      }
    >
      {programmes.map((one) => (
        <Row key={one.code} className={one.archivedAt === null ? undefined : 'text-ink-2'}>
          <Cell heading mono>
            <Link href={`/programmes/${encodeURIComponent(one.code)}` as Route} className="underline">
              {one.code}
            </Link>
          </Cell>
          <Cell wrap>
            {one.title} {one.archivedAt === null ? null : <StateTag state="archived" />}
          </Cell>
          <Cell>
            {one.leads.length === 0 ? (
              <span className="text-warn">none named yet</span>
            ) : (
              one.leads.join(', ')
            )}
          </Cell>
          <Cell numeric>{one.nTargets}</Cell>
          <Cell numeric>{one.nNights}</Cell>
          <Cell>
            {one.proprietaryEndedAt !== null
              ? 'ended by the PI'
              : one.proprietaryUntil === null
                ? 'no nights yet'
                : formatDateInWords(one.proprietaryUntil)}
          </Cell>
        </Row>
      ))}
    </DataTable>
  );
}
