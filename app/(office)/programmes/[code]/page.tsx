import type { Metadata, Route } from 'next';
import Link from 'next/link';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatCount, noValue } from '@/lib/contracts/format-figure';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { LinkButton } from '@/app/_components/ui/link-button';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { StateTag } from '@/app/_components/ui/state-tag';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { programmePage, type ProgrammePage as Shown } from '@/lib/server/reads/programme-page';
import { Members } from './_components/members';
import { PeriodPanel } from './_components/period-panel';
import { ProgrammeForm } from './_components/programme-form';
import { Targets } from './_components/targets';

export async function generateMetadata({ params }: PageProps<'/programmes/[code]'>): Promise<Metadata> {
  return { title: decodeURIComponent((await params).code) };
}

export default async function ProgrammePage({ params }: PageProps<'/programmes/[code]'>) {
  const caller = await callerOrSignIn();
  const code = decodeURIComponent((await params).code);
  const shown = await orNotFound(programmePage(caller, code));
  const { programme, members, targets, nights, mayManage, people } = shown;
  return (
    <>
      <PageHead
        title={programme.title}
        actions={
          <LinkButton href={`/audit?programme=${encodeURIComponent(code)}` as Route}>Audit trail</LinkButton>
        }
      >
        <span className="font-mono text-ink-2">{programme.code}</span>
        {programme.archivedAt === null ? null : <StateTag state="archived" />}
      </PageHead>
      {programme.summary === '' ? null : (
        <p className="mb-4 max-w-prose whitespace-pre-line">{programme.summary}</p>
      )}
      <div className="grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_minmax(340px,26%)]">
        <div className="grid gap-5">
          <Targets programme={code} targets={targets} mayManage={mayManage} />
          <Nights programme={code} nights={nights} />
        </div>
        <div className="grid gap-5">
          <Members programme={code} members={members} people={people} mayManage={mayManage} />
          <PeriodPanel
            programme={code}
            months={programme.proprietaryMonths}
            until={programme.proprietaryUntil}
            endedAt={programme.proprietaryEndedAt?.toISOString() ?? null}
            mayEnd={shown.mayEndPeriod}
          />
          {mayManage ? (
            <Panel title="Change">
              <ProgrammeForm
                programme={code}
                values={{
                  title: programme.title,
                  summary: programme.summary,
                  proprietaryMonths: programme.proprietaryMonths,
                }}
                isArchived={programme.archivedAt !== null}
              />
            </Panel>
          ) : null}
        </div>
      </div>
    </>
  );
}

interface NightsProps {
  readonly programme: string;
  readonly nights: Shown['nights'];
}

function Nights({ programme, nights }: NightsProps) {
  return (
    <Panel title="Nights" note="with frames of the programme" flush>
      {nights.length === 0 ? (
        <EmptyState title="No nights yet">
          A night appears here with its first frame of the programme.
        </EmptyState>
      ) : (
        <DataTable
          caption="Nights with frames of the programme"
          head={
            <tr>
              <HeadCell>Night</HeadCell>
              <HeadCell>Telescope</HeadCell>
              <HeadCell>State</HeadCell>
              <HeadCell numeric>Frames</HeadCell>
              <HeadCell>Verdict</HeadCell>
              <HeadCell numeric>Calibrated stars</HeadCell>
            </tr>
          }
        >
          {nights.map((one) => (
            <Row key={one.night}>
              <Cell heading>
                <Link href={`/nights/${one.night}` as Route} className="underline">
                  {formatDateInWords(one.date)}
                </Link>
              </Cell>
              <Cell>{one.telescope}</Cell>
              <Cell>
                <StateTag state={one.state} />
              </Cell>
              <Cell numeric>{formatCount(one.frames)}</Cell>
              <Cell>{one.verdict === null ? noValue : <StateTag state={one.verdict} />}</Cell>
              <Cell numeric>
                {one.stars === null ? (
                  noValue
                ) : (
                  <Link href={resultsOf(one.night, programme)} className="underline">
                    {formatCount(one.stars)}
                  </Link>
                )}
              </Cell>
            </Row>
          ))}
        </DataTable>
      )}
    </Panel>
  );
}

const resultsOf = (night: string, programme: string): Route =>
  `/nights/${night}/results?programme=${encodeURIComponent(programme)}` as Route;
