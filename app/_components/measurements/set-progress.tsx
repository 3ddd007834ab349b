'use client';

import { useEffect, useRef, useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useJob } from '@/app/_components/hooks/use-job';
import { Button } from '@/app/_components/ui/button';
import { ProgressBar } from '@/app/_components/ui/progress-bar';
import { cancelJob, hasEnded } from '@/lib/contracts/api/job';
import { getMeasurementSet, type MeasurementSet } from '@/lib/contracts/api/measurement-set';

interface SetProgressProps {
  readonly set: string;
  readonly job: NonNullable<MeasurementSet['job']>;
  /** The check has come to its end, whichever it is. */
  readonly onEnd: () => void;
}

/** How far a check is, as it happens, and a way to stop it. Whoever may not follow the job asks for the set instead. */
export function SetProgress({ set, job: first, onEnd }: SetProgressProps) {
  const { job, link } = useJob(first.id);
  const asked = useAskedSet(set, job === null);
  const present = job ?? asked?.job ?? first;
  const ended =
    hasEnded(present.state) || (asked !== null && asked.state !== 'received' && asked.state !== 'checked');
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
          Stop the check
        </Button>
      ) : null}
    </div>
  );
}

const ask_ms = 2500;

/** The set as the server has it, asked for from time to time while `isAsking`. */
function useAskedSet(id: string, isAsking: boolean): MeasurementSet | null {
  const [set, setSet] = useState<MeasurementSet | null>(null);
  useEffect(() => {
    if (!isAsking) return;
    const timer = setInterval(() => {
      void callApi(getMeasurementSet, { params: { id } }).then((result) => {
        if (result.ok) setSet(result.value);
      });
    }, ask_ms);
    return () => clearInterval(timer);
  }, [id, isAsking]);
  return set;
}
