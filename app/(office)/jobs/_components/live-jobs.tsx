'use client';

import { useRouter } from 'next/navigation';
import { useCallback, useEffect, useRef, useState } from 'react';
import { useNow } from '@/app/_components/hooks/use-now';
import { DataTable, HeadCell } from '@/app/_components/ui/data-table';
import { hasEnded, type Job } from '@/lib/contracts/api/job';
import { JobRow } from './job-row';

interface LiveJobsProps {
  readonly jobs: readonly Job[];
  /** `?state=…`, with its limit: where the same list comes from. */
  readonly search: string;
  readonly serverNow: number;
}

const busy_ms = 1_500;
const quiet_ms = 5_000;

/** The list of jobs, kept up to date while somebody looks at it. */
export function LiveJobs({ jobs: first, search, serverNow }: LiveJobsProps) {
  const router = useRouter();
  const now = useNow(serverNow);
  const [jobs, setJobs] = useState(first);
  const [isLost, setLost] = useState(false);
  const known = useRef(statesOf(first));

  const renew = useCallback(
    async (signal?: AbortSignal): Promise<number> => {
      const newest = await present(search, signal);
      if (signal?.aborted === true) return quiet_ms;
      setLost(newest === null);
      if (newest === null) return quiet_ms;
      setJobs(newest);
      const states = statesOf(newest);
      // The counts of the tabs come with the page.
      if (states !== known.current) router.refresh();
      known.current = states;
      return newest.every((job) => hasEnded(job.state)) ? quiet_ms : busy_ms;
    },
    [search, router],
  );

  useEffect(() => {
    const stopping = new AbortController();
    let timer: ReturnType<typeof setTimeout> | undefined;
    const look = async (): Promise<void> => {
      const wait_ms = document.hidden ? quiet_ms : await renew(stopping.signal);
      if (!stopping.signal.aborted) timer = setTimeout(() => void look(), wait_ms);
    };
    timer = setTimeout(() => void look(), busy_ms);
    return () => {
      stopping.abort();
      clearTimeout(timer);
    };
  }, [renew]);

  return (
    <>
      {isLost ? (
        <p role="status" className="border-b border-rule px-3.5 py-2 text-table text-warn">
          ▲ The list cannot be renewed just now. It is tried again by itself.
        </p>
      ) : null}
      <DataTable
        caption="Jobs, the newest first"
        head={
          <tr>
            <HeadCell>Job</HeadCell>
            <HeadCell>About</HeadCell>
            <HeadCell>State</HeadCell>
            <HeadCell>What it says</HeadCell>
            <HeadCell>Asked for by</HeadCell>
            <HeadCell unit="UTC">Queued</HeadCell>
            <HeadCell numeric>Duration</HeadCell>
            <HeadCell numeric>Tries</HeadCell>
            <HeadCell>
              <span className="sr-only">What you can do</span>
            </HeadCell>
          </tr>
        }
      >
        {jobs.map((job) => (
          <JobRow key={job.id} job={job} now={now} onChange={() => void renew()} />
        ))}
      </DataTable>
    </>
  );
}

const statesOf = (jobs: readonly Job[]): string => jobs.map(({ id, state }) => `${id} ${state}`).join();

async function present(search: string, signal: AbortSignal | undefined): Promise<readonly Job[] | null> {
  try {
    const response = await fetch(`/api/v1/jobs${search}`, {
      headers: { accept: 'application/json' },
      ...(signal === undefined ? {} : { signal }),
    });
    if (!response.ok) return null;
    return ((await response.json()) as { items: readonly Job[] }).items;
  } catch {
    // Fetch rejects for a dead link and for an abort alike; the caller looks at the signal first.
    return null;
  }
}
