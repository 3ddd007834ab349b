'use client';

import type { Route } from 'next';
import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import { useJob } from '@/app/_components/hooks/use-job';
import { ActButton } from '@/app/_components/ui/act-button';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { LinkButton } from '@/app/_components/ui/link-button';
import { Panel } from '@/app/_components/ui/panel';
import { ProgressBar } from '@/app/_components/ui/progress-bar';
import { hasEnded } from '@/lib/contracts/api/job';
import type { CalibratedPage, NoResult as Reason } from '@/lib/contracts/calibrated-page';
import { transformAgainAction } from '../actions';
import { resultsAddress } from './results-address';

interface NoResultProps {
  readonly page: CalibratedPage;
  readonly reason: Reason;
}

/** Why there are no magnitudes here, and what brings them. */
export function NoResult({ page, reason }: NoResultProps) {
  return (
    <Panel title="Calibrated magnitudes">
      {reason.why === 'running' ? <Running reason={reason} /> : <Why night={page.night} reason={reason} />}
      <Earlier page={page} />
    </Panel>
  );
}

/** What was published before stays to be read, but is not shown in place of what is not there. */
function Earlier({ page: { night, programme, solutions } }: { readonly page: CalibratedPage }) {
  if (solutions.length === 0 || programme === null) return null;
  return (
    <p className="mt-3 text-table text-ink-2">
      Earlier magnitudes of {programme === '' ? 'targets of no programme' : programme}:{' '}
      {solutions.map(({ id, number, state }, i) => (
        <span key={id}>
          {i === 0 ? '' : ', '}
          <Link href={resultsAddress(night, { programme, solution: id })}>
            solution {number}, {state}
          </Link>
        </span>
      ))}
    </p>
  );
}

function Why({
  night,
  reason,
}: {
  readonly night: string;
  readonly reason: Exclude<Reason, { why: 'running' }>;
}) {
  switch (reason.why) {
    case 'hidden':
      return (
        <EmptyState title="Not yours to see">
          Calibrated magnitudes of a night are seen by its observers, by photometrists and managers, and by
          the investigators of the programmes observed in it.
        </EmptyState>
      );
    case 'no-solution':
      return (
        <EmptyState title="No approved solution yet">
          The night’s targets are transformed to standard magnitudes as soon as a photometrist has proposed a
          solution and another one has approved it.
        </EmptyState>
      );
    case 'not-photometric':
      return (
        <EmptyState
          title="Not photometric"
          action={<LinkButton href={`/solutions/${reason.solution}` as Route}>The solution</LinkButton>}
        >
          The night was judged not photometric, so no magnitudes on the standard system were derived. Its
          instrumental measurements stay available; whoever doubts the judgement asks a photometrist.
        </EmptyState>
      );
    case 'no-targets':
      return (
        <EmptyState
          title="No calibrated stars"
          action={<LinkButton href={`/nights/${night}/measurements` as Route}>Measurements</LinkButton>}
        >
          The solution is approved, but no measurement of a target that you may see was there to transform.
        </EmptyState>
      );
  }
}

const look_ms = 3000;

function Running({ reason }: { readonly reason: Extract<Reason, { why: 'running' }> }) {
  const { job: first, solution, mayStart } = reason;
  const router = useRouter();
  const { job, link } = useJob(first !== null && !hasEnded(first.state) ? first.id : null);
  const present = job ?? first;
  const isOver = job !== null && hasEnded(job.state);
  useEffect(() => {
    if (isOver) router.refresh();
  }, [isOver, router]);
  useEffect(() => {
    // Where the job cannot be followed, the page looks from time to time.
    if (job !== null) return;
    const timer = setInterval(() => router.refresh(), look_ms);
    return () => clearInterval(timer);
  }, [job, router]);
  if (present?.state === 'failed' || present?.state === 'cancelled') {
    return (
      <EmptyState
        title={present.state === 'failed' ? 'The transformation failed' : 'The transformation was cancelled'}
        action={
          mayStart ? (
            <ActButton
              action={transformAgainAction}
              values={{ solution }}
              look="primary"
              busyLabel="Queuing…"
              onDone={() => {
                router.refresh();
              }}
            >
              Transform the targets
            </ActButton>
          ) : null
        }
      >
        The solution is approved, but its magnitudes were not made.{' '}
        {mayStart ? null : 'A photometrist or a manager can start the transformation again.'}
      </EmptyState>
    );
  }
  return (
    <ProgressBar
      value={present === null || present.state === 'queued' ? null : present.progress}
      label={present?.message || 'The targets wait to be transformed'}
      {...(link === 'lost' ? { left: 'no link just now; the work goes on' } : {})}
    />
  );
}
