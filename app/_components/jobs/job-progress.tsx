'use client';

import { useEffect, useRef, useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useJob } from '@/app/_components/hooks/use-job';
import { Button } from '@/app/_components/ui/button';
import { ProgressBar } from '@/app/_components/ui/progress-bar';
import { cancelJob, hasEnded, type JobState } from '@/lib/contracts/api/job';

/** A job as the thing that it works on knows it. */
export interface KnownJob {
  readonly id: string;
  readonly state: JobState;
  readonly progress: number;
  readonly message: string;
}

interface JobProgressProps {
  readonly job: KnownJob;
  /** Asks for the job by way of what it works on: for those who may see that, but may not follow the job. */
  readonly ask: () => Promise<KnownJob | null>;
  readonly stopLabel: string;
  /** It has come to its end, whichever it is. */
  readonly onEnd: () => void;
}

/** How far a job is, as it happens, and a way to stop it. */
export function JobProgress({ job: first, ask, stopLabel, onEnd }: JobProgressProps) {
  const { job, link } = useJob(first.id);
  const asked = useAsked(ask, job === null);
  const present = job ?? asked ?? first;
  const ended = hasEnded(present.state);
  const end = useRef(onEnd);
  useEffect(() => {
    end.current = onEnd;
  });
  useEffect(() => {
    if (ended) end.current();
  }, [ended]);
  const [isStopping, setStopping] = useState(false);
  const stop = async () => {
    setStopping(true);
    // Whether it ended before it could be stopped, the next word of the job says.
    await callApi(cancelJob, { params: { id: first.id } });
  };
  return (
    <div className="flex flex-wrap items-end gap-3">
      <div className="min-w-60 grow">
        <ProgressBar
          value={present.state === 'queued' ? null : present.progress}
          label={present.message || (present.state === 'queued' ? 'Waiting for its turn' : 'Beginning')}
          {...(link === 'lost' ? { left: 'no link just now; the work goes on' } : {})}
        />
      </div>
      {job?.may_cancel === true && !ended ? (
        <Button busy={isStopping} busyLabel="Stopping …" onClick={() => void stop()}>
          {stopLabel}
        </Button>
      ) : null}
    </div>
  );
}

const ask_ms = 2500;

/** The job as it was last told, asked for from time to time while `isAsking`. */
function useAsked(ask: () => Promise<KnownJob | null>, isAsking: boolean): KnownJob | null {
  const [job, setJob] = useState<KnownJob | null>(null);
  const latest = useRef(ask);
  useEffect(() => {
    latest.current = ask;
  });
  useEffect(() => {
    if (!isAsking) return;
    const timer = setInterval(() => {
      void latest.current().then((told) => {
        if (told !== null) setJob(told);
      });
    }, ask_ms);
    return () => clearInterval(timer);
  }, [isAsking]);
  return job;
}
