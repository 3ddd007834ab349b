'use client';

import { useRouter } from 'next/navigation';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { checkMeasurementSet } from '@/lib/contracts/api/measurement-set';

/** Starts the check of a set again that was cancelled, or failed for a reason that was not the table's. */
export function CheckAgain({ set }: { readonly set: string }) {
  const router = useRouter();
  const { isBusy, refusal, run } = useApiCall();
  const check = async () => {
    await run(callApi(checkMeasurementSet, { params: { id: set } }));
    // Refused or not: the page is to show how the set stands now.
    router.refresh();
  };
  return (
    <span>
      <Button look="primary" busy={isBusy} onClick={() => void check()}>
        Check again
      </Button>
      {refusal === null ? null : (
        <span role="alert" className="ml-2 text-small font-medium text-bad">
          {refusal.detail}
        </span>
      )}
    </span>
  );
}
