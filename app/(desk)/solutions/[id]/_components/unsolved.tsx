'use client';

import Link from 'next/link';
import type { Route } from 'next';
import { useRouter } from 'next/navigation';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { SolveProgress } from '@/app/_components/solutions/solve-progress';
import { Button } from '@/app/_components/ui/button';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Finding } from '@/app/_components/ui/finding';
import { Panel } from '@/app/_components/ui/panel';
import { solveNight, type Solution } from '@/lib/contracts/api/solution';

/** The solve as it goes on; when it has ended the page shows what it came to. */
export function Solving({ solution }: { readonly solution: Solution }) {
  const router = useRouter();
  if (solution.job === null) return null;
  return (
    <Panel title="Being solved" note="you may leave this page; the solve goes on">
      <SolveProgress solution={solution.id} job={solution.job} onEnd={() => router.refresh()} />
    </Panel>
  );
}

/** A solve that came to nothing for a reason that was not the night's. */
export function NotFinished({ solution }: { readonly solution: Solution }) {
  const router = useRouter();
  const { isBusy, refusal, run } = useApiCall();
  const { job, night, model, may } = solution;
  const again = async () => {
    const done = await run(callApi(solveNight, { params: { id: night }, body: model.options }));
    if (done !== null) router.push(`/solutions/${done.value.solution}` as Route);
  };
  const why = job?.state === 'cancelled' ? 'The solve was cancelled.' : 'The solve could not be finished.';
  return (
    <div className="grid gap-3">
      <Finding tone={job?.state === 'cancelled' ? 'warn' : 'bad'} word="Not solved">
        {why} {job?.state === 'failed' && job.message !== '' ? `${job.message} ` : ''}
        Nothing of it is kept but what was asked.{' '}
        {job === null ? null : <Link href={'/jobs' as Route}>The list of jobs</Link>}
        {job === null ? '' : ' says more.'}
      </Finding>
      {refusal === null ? null : <ErrorNotice fault={refusal} />}
      {may.solve_again ? (
        <span>
          <Button look="primary" busy={isBusy} busyLabel="Queueing …" onClick={() => void again()}>
            Solve again, the same way
          </Button>
        </span>
      ) : null}
    </div>
  );
}
