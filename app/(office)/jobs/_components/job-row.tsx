import type { Route } from 'next';
import Link from 'next/link';
import { ActButton } from '@/app/_components/ui/act-button';
import { Cell, Row } from '@/app/_components/ui/data-table';
import { formatInstant } from '@/app/_components/ui/format-time';
import { ProgressBar } from '@/app/_components/ui/progress-bar';
import { StateTag } from '@/app/_components/ui/state-tag';
import type { Job } from '@/lib/contracts/api/job';
import { cancelJobAction, retryJobAction } from '../actions';
import { formatSpan, jobSpan_ms } from './job-times';

interface JobRowProps {
  readonly job: Job;
  readonly now: number;
  /** After the job was cancelled or queued again. */
  readonly onChange: () => void;
}

export function JobRow({ job, now, onChange }: JobRowProps) {
  const span_ms = jobSpan_ms(job, now);
  return (
    <Row>
      <Cell heading className="font-medium">
        {job.title}
      </Cell>
      <Cell wrap>
        <About job={job} />
      </Cell>
      <Cell>
        <StateTag state={job.state} />
        {job.cancel_requested && job.state === 'running' ? (
          <span className="ml-1 text-small text-ink-2">asked to stop</span>
        ) : null}
      </Cell>
      <Cell wrap className="max-w-88">
        <Tells job={job} now={now} />
      </Cell>
      <Cell>{job.created_by ?? 'the service'}</Cell>
      <Cell mono>{formatInstant(job.created_at)}</Cell>
      <Cell numeric>{span_ms === null ? '–' : formatSpan(span_ms)}</Cell>
      <Cell numeric>{triesOf(job)}</Cell>
      <Cell>
        <JobActs job={job} onChange={onChange} />
      </Cell>
    </Row>
  );
}

/** Mail is tried again for days: of how many tries tells a reader nothing. */
const countable = 10;
const triesOf = ({ tries, max_tries }: Job): string =>
  max_tries > countable ? String(tries) : `${tries} of ${max_tries}`;

function subjectOf({ set, solution }: Job): Route | null {
  if (set !== null) return `/measurement-sets/${set}` as Route;
  return solution === null ? null : (`/solutions/${solution}` as Route);
}

function About({ job }: { readonly job: Job }) {
  const night = job.night_date === null ? null : `${job.telescope ?? ''} ${job.night_date}`.trim();
  const subject = subjectOf(job);
  return (
    <>
      {subject === null ? job.about : <Link href={subject}>{job.about}</Link>}
      {job.about !== '' && night !== null ? ', ' : null}
      {night === null || job.night === null ? null : (
        <Link className="whitespace-nowrap" href={`/nights/${job.night}` as Route}>
          {night}
        </Link>
      )}
    </>
  );
}

/** What a job has to say of itself: how far it is, why it waits, what went wrong. */
function Tells({ job, now }: { readonly job: Job; readonly now: number }) {
  if (job.state === 'running') return <ProgressBar value={job.progress} label={job.message || 'under way'} />;
  const wait_ms = job.next_try_at === null ? 0 : Date.parse(job.next_try_at) - now;
  return (
    <>
      {job.error === undefined ? null : (
        <p>
          {job.state === 'queued' ? 'Last try: ' : null}
          {job.error.message}
          {job.error.reference === undefined ? null : (
            <span className="block text-small text-ink-2">
              Reference <code className="wrap-anywhere">{job.error.reference}</code>
            </span>
          )}
        </p>
      )}
      {job.state === 'queued' && wait_ms > 1000 ? <p>Next try in {formatSpan(wait_ms)}.</p> : null}
    </>
  );
}

function JobActs({ job, onChange }: { readonly job: Job; readonly onChange: () => void }) {
  const what = job.about === '' ? job.title : `${job.title}: ${job.about}`;
  return (
    <>
      {job.may_cancel && !job.cancel_requested ? (
        <ActButton
          action={cancelJobAction}
          values={{ job: job.id }}
          label={`Cancel ${what}`}
          busyLabel="Cancelling…"
          onDone={onChange}
        >
          Cancel
        </ActButton>
      ) : null}
      {job.may_retry ? (
        <ActButton
          action={retryJobAction}
          values={{ job: job.id }}
          label={`Try again: ${what}`}
          busyLabel="Queuing…"
          onDone={onChange}
        >
          Try again
        </ActButton>
      ) : null}
    </>
  );
}
