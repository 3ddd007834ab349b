import type { Metadata, Route } from 'next';
import Link from 'next/link';
import { nightSky } from '@/app/_components/charts/night-band/night-sky';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { Finding } from '@/app/_components/ui/finding';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { KeyValues } from '@/app/_components/ui/key-values';
import { LinkButton } from '@/app/_components/ui/link-button';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { StateTag } from '@/app/_components/ui/state-tag';
import type { Night } from '@/lib/contracts/api/night';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { nightPage } from '@/lib/server/reads/night-page';
import { tonight, type TonightAt } from '@/lib/server/reads/tonight';
import { waiting } from '@/lib/server/reads/waiting';
import { AddressedBand } from './_components/addressed-band';
import { bandConditions, bandFrames } from './_components/band-data';
import { fieldsTaken } from './_components/fields-taken';
import { nightFacts } from './_components/night-facts';
import { OpenNightButton } from './_components/open-night-button';
import { WaitingList } from './_components/waiting-list';

export const metadata: Metadata = { title: 'Tonight' };

async function presentTime() {
  return Date.now();
}

export default async function TonightPage() {
  const [caller, now] = await Promise.all([callerOrSignIn(), presentTime()]);
  const [{ telescopes, leftOpen, mayOpen }, waits] = await Promise.all([
    tonight(caller, now),
    waiting(caller),
  ]);
  // At the telescope the night comes first; for everybody else what there is to do.
  const isObserver = caller.roles.has('observer');
  return (
    <>
      <PageHead title="Tonight" />
      {isObserver ? null : <WaitingList waiting={waits} />}
      {leftOpen.length === 0 ? null : <LeftOpen nights={leftOpen} />}
      {telescopes.length === 0 ? (
        <Panel flush>
          <EmptyState title="No telescope yet">
            Tonight’s Sun, Moon and log stand here for each telescope. A manager enters site and telescope
            under Equipment.
          </EmptyState>
        </Panel>
      ) : (
        telescopes.map((at) => (
          <AtTelescope key={at.telescope.code} at={at} mayOpen={mayOpen} caller={caller} now={now} />
        ))
      )}
      {isObserver ? <WaitingList waiting={waits} /> : null}
    </>
  );
}

function LeftOpen({ nights }: { readonly nights: readonly Night[] }) {
  return (
    <Finding tone="warn" className="mb-4">
      {nights.length === 1
        ? 'An earlier night is still open: '
        : `${nights.length} earlier nights are still open: `}
      {nights.map(({ id, date, telescope }, i) => (
        <span key={id}>
          {i > 0 ? ', ' : ''}
          <Link href={`/nights/${id}` as Route}>
            {formatDateInWords(date)}, {telescope}
          </Link>
        </span>
      ))}
      . Measurements can be calibrated once a night is closed.
    </Finding>
  );
}

interface AtTelescopeProps {
  readonly at: TonightAt;
  readonly mayOpen: boolean;
  readonly caller: Awaited<ReturnType<typeof callerOrSignIn>>;
  readonly now: number;
}

async function AtTelescope({ at, mayOpen, caller, now }: AtTelescopeProps) {
  const { telescope, date, night } = at;
  const log = night === null ? null : await nightPage(caller, night.id);
  const frames = log?.frames ?? [];
  const sky = nightSky({
    site: telescope.site,
    date,
    fields: fieldsTaken(frames),
    cover: frames.map(({ utc_mid }) => Date.parse(utc_mid)),
  });
  const action =
    night !== null ? (
      <LinkButton href={`/nights/${night.id}` as Route} look="primary">
        {log?.may.log === true ? 'Continue the log' : 'See the log'}
      </LinkButton>
    ) : mayOpen ? (
      <OpenNightButton telescope={telescope.code} date={date} />
    ) : null;
  return (
    <section aria-labelledby={`at-${telescope.code}`} className="mb-8">
      <div className="mb-3 flex flex-wrap items-baseline gap-x-4 gap-y-2">
        <h2 id={`at-${telescope.code}`} className="text-lead font-medium">
          {telescope.name}
        </h2>
        <span className="text-ink-2">
          {telescope.site.name}, night of {formatDateInWords(date)}
        </span>
        <StateTag state={night?.state ?? 'not opened'} />
        <span className="ml-auto">{action}</span>
      </div>
      <AddressedBand
        sky={sky}
        frames={bandFrames(frames)}
        conditions={bandConditions(log?.conditions ?? [])}
        serverNow={now}
      />
      <div className="grid gap-5 md:grid-cols-2">
        <Panel title="Sun and Moon" note="UTC">
          <KeyValues items={nightFacts(sky)} />
        </Panel>
        <Panel title="The log" note={night === null ? 'not opened yet' : undefined}>
          {night === null ? (
            <p className="max-w-prose text-ink-2">
              {mayOpen
                ? 'Open the night to log frames and conditions. Whoever opens it becomes its observer.'
                : 'An observer opens the night; its frames and conditions then appear here.'}
            </p>
          ) : (
            <KeyValues items={logFacts(night)} />
          )}
        </Panel>
      </div>
    </section>
  );
}

function logFacts(night: Night) {
  return [
    { key: 'Observers', value: night.observers.map(({ name }) => name).join(', ') || 'nobody named' },
    { key: 'Frames', value: String(night.frames), figure: true },
    { key: 'Conditions', value: `${night.conditions} entries`, figure: true },
    { key: 'Time lost', value: `${night.minutes_lost} min`, figure: true },
  ];
}
