'use client';

import { callApi } from '@/app/_components/hooks/call-api';
import { JobProgress } from '@/app/_components/jobs/job-progress';
import { getMeasurementSet, type MeasurementSet } from '@/lib/contracts/api/measurement-set';

interface SetProgressProps {
  readonly set: string;
  readonly job: NonNullable<MeasurementSet['job']>;
  /** The check has come to its end, whichever it is. */
  readonly onEnd: () => void;
}

/** How far a check is, and a way to stop it. */
export function SetProgress({ set, job, onEnd }: SetProgressProps) {
  const ask = async () => {
    const result = await callApi(getMeasurementSet, { params: { id: set } });
    if (!result.ok) return null;
    const isUnfinished = result.value.state === 'received' || result.value.state === 'checked';
    return result.value.job ?? (isUnfinished ? null : { ...job, state: 'done' as const, progress: 1 });
  };
  return <JobProgress job={job} ask={ask} stopLabel="Stop the check" onEnd={onEnd} />;
}
