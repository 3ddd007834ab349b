import type { Metadata, Route } from 'next';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { LinkButton } from '@/app/_components/ui/link-button';
import { PageHead } from '@/app/_components/ui/page-head';
import { Pagination } from '@/app/_components/ui/pagination';
import { Panel } from '@/app/_components/ui/panel';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { listNights } from '@/lib/server/reads/list-nights';
import { nightsCalendar } from '@/lib/server/reads/nights-calendar';
import { tonight } from '@/lib/server/reads/tonight';
import { NightsCalendar } from './_components/nights-calendar';
import { NightsFilter } from './_components/nights-filter';
import { nightsAddress, nightsQuery, type NightsQuery } from './_components/nights-query';
import { NightsTable } from './_components/nights-table';
import { OpenNightForm } from './_components/open-night-form';

export const metadata: Metadata = { title: 'Nights' };

const perPage = 50;

async function presentTime() {
  return Date.now();
}

export default async function NightsPage({ searchParams }: PageProps<'/nights'>) {
  const [caller, now, values] = await Promise.all([callerOrSignIn(), presentTime(), searchParams]);
  const query = nightsQuery(values);
  const { month, ...filter } = query;
  const today = new Date(now).toISOString().slice(0, 10);
  const places = await tonight(caller, now);
  const evening = places.telescopes[0]?.date ?? today;
  const shownMonth = month ?? evening.slice(0, 7);
  const [list, calendar] = await Promise.all([
    listNights(caller, { ...filter, limit: perPage }),
    nightsCalendar(caller, { month: shownMonth, telescope: query.telescope }),
  ]);
  const telescopes = places.telescopes.map(({ telescope }) => telescope);
  return (
    <>
      <PageHead title="Nights" />
      <div className="grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_minmax(380px,30%)]">
        <Panel title="Nights" note="the latest first" flush>
          <NightsFilter query={query} telescopes={telescopes} />
          {list.items.length === 0 ? (
            <NoNights query={query} mayOpen={places.mayOpen} />
          ) : (
            <NightsTable nights={list.items} />
          )}
          <Pagination
            noun="nights"
            first={query.after === undefined ? null : (nightsAddress(query, { after: undefined }) as Route)}
            next={list.next === null ? null : (nightsAddress(query, { after: list.next }) as Route)}
          />
        </Panel>
        <div className="grid content-start gap-5">
          <NightsCalendar
            month={shownMonth}
            today={evening}
            nights={calendar}
            query={query}
            showsTelescope={telescopes.length > 1}
          />
          {places.mayOpen && telescopes.length > 0 ? (
            <Panel title="Open a night">
              <OpenNightForm telescopes={telescopes} date={evening} />
            </Panel>
          ) : null}
        </div>
      </div>
    </>
  );
}

function NoNights({ query, mayOpen }: { readonly query: NightsQuery; readonly mayOpen: boolean }) {
  const isNarrowed = [query.telescope, query.state, query.from, query.to, query.after].some(Boolean);
  if (isNarrowed) {
    return (
      <EmptyState
        title="No night is like that"
        action={<LinkButton href={'/nights' as Route}>All nights</LinkButton>}
      >
        Widen the dates, or leave telescope and state open.
      </EmptyState>
    );
  }
  return (
    <EmptyState title="No nights yet">
      {mayOpen
        ? 'A night holds the frames, conditions and measurements of one telescope and one evening. Open the first one here.'
        : 'Nights with frames of your programmes appear here as soon as they are logged.'}
    </EmptyState>
  );
}
