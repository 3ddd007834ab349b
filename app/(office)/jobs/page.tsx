import type { Metadata, Route } from 'next';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { LinkButton } from '@/app/_components/ui/link-button';
import { PageHead } from '@/app/_components/ui/page-head';
import { Pagination } from '@/app/_components/ui/pagination';
import { Panel } from '@/app/_components/ui/panel';
import { Tabs } from '@/app/_components/ui/tabs';
import { jobStates } from '@/lib/contracts/api/job';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { readJobCounts, readJobs } from '@/lib/server/reads/jobs';
import { JobsFilter } from './_components/jobs-filter';
import { jobsPerPage, jobsQuery, jobsSearch, type JobsQuery } from './_components/jobs-query';
import { LiveJobs } from './_components/live-jobs';

export const metadata: Metadata = { title: 'Jobs' };

async function presentTime() {
  return Date.now();
}

export default async function JobsPage({ searchParams }: PageProps<'/jobs'>) {
  const [caller, now, values] = await Promise.all([callerOrSignIn(), presentTime(), searchParams]);
  const query = jobsQuery(values);
  const [list, counts] = await Promise.all([
    readJobs(caller, { ...query, limit: jobsPerPage }),
    readJobCounts(caller),
  ]);
  const search = jobsSearch(query);
  const all = Object.values(counts).reduce((sum, n) => sum + n, 0);
  const tab = (label: string, state: JobsQuery['state'], n: number) => ({
    href: `/jobs${jobsSearch(query, { state, after: undefined })}` as Route,
    label,
    count: n.toLocaleString('en-GB'),
    isCurrent: query.state === state,
  });
  return (
    <>
      <PageHead title="Jobs">
        <span className="text-ink-2">
          {caller.roles.has('manager')
            ? 'What the service does in its own time'
            : 'What the service does in its own time: for you, for your programmes, and for solutions that you may see'}
        </span>
      </PageHead>
      <Tabs
        label="Jobs by state"
        tabs={[tab('all', undefined, all), ...jobStates.map((state) => tab(state, state, counts[state]))]}
      />
      <Panel flush>
        <JobsFilter query={query} />
        {list.items.length === 0 ? (
          <NoJobs query={query} />
        ) : (
          <LiveJobs
            key={search}
            jobs={list.items}
            search={search === '' ? `?limit=${jobsPerPage}` : `${search}&limit=${jobsPerPage}`}
            serverNow={now}
          />
        )}
        <Pagination
          noun="jobs"
          first={
            query.after === undefined ? null : (`/jobs${jobsSearch(query, { after: undefined })}` as Route)
          }
          next={list.next === null ? null : (`/jobs${jobsSearch(query, { after: list.next })}` as Route)}
        />
      </Panel>
    </>
  );
}

function NoJobs({ query }: { readonly query: JobsQuery }) {
  if (query.state !== undefined || query.kind !== undefined || query.after !== undefined) {
    return (
      <EmptyState title="No job is like that" action={<LinkButton href="/jobs">All jobs</LinkButton>}>
        Nothing that you may see is in this state or of this kind.
      </EmptyState>
    );
  }
  return (
    <EmptyState title="No jobs yet" action={<LinkButton href="/nights">To the nights</LinkButton>}>
      Checking an upload is a job: when you send measurements from the page of a night, it appears here with
      its progress.
    </EmptyState>
  );
}
