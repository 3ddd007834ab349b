'use client';

import { callApi } from '@/app/_components/hooks/call-api';
import { JobProgress } from '@/app/_components/jobs/job-progress';
import { getSolution, type Solution } from '@/lib/contracts/api/solution';

interface SolveProgressProps {
  readonly solution: string;
  readonly job: NonNullable<Solution['job']>;
  /** The solve has come to its end, whichever it is. */
  readonly onEnd: () => void;
}

/** How far a solve is, and a way to stop it. */
export function SolveProgress({ solution, job, onEnd }: SolveProgressProps) {
  const ask = async () => {
    const result = await callApi(getSolution, { params: { id: solution } });
    return result.ok ? result.value.job : null;
  };
  return <JobProgress job={job} ask={ask} stopLabel="Stop the solve" onEnd={onEnd} />;
}
