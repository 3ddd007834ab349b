'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';
import { refuseMeasurementSet } from '@/lib/contracts/api/measurement-set';

/** Takes a set back that nothing uses yet, with a reason; the original stays. */
export function TakeBack({ set, name }: { readonly set: string; readonly name: string }) {
  const router = useRouter();
  const [isOpen, setOpen] = useState(false);
  const [reason, setReason] = useState('');
  const [error, setError] = useState<string | null>(null);
  const { isBusy, refusal, run } = useApiCall();
  const takeBack = async () => {
    if (reason.trim().length < 3)
      return setError('Say why, in a few words; the reason is kept with the set.');
    setError(null);
    const done = await run(callApi(refuseMeasurementSet, { params: { id: set }, body: { reason } }));
    if (done === null) return;
    setOpen(false);
    router.refresh();
  };
  return (
    <>
      <Button onClick={() => setOpen(true)}>Take back</Button>
      <Dialog
        open={isOpen}
        onClose={() => setOpen(false)}
        title={`Take “${name}” back`}
        actions={
          <Button look="bad" busy={isBusy} onClick={() => void takeBack()}>
            Take the set back
          </Button>
        }
      >
        <div className="grid gap-3">
          {refusal === null ? null : <ErrorNotice fault={refusal} />}
          <p>
            Its rows are removed, and the set counts as refused. The original file and the frames that it
            brought into the log stay. The same file can then be uploaded again.
          </p>
          <Field label="Why" required error={error}>
            {(control) => (
              <TextInput
                {...control}
                value={reason}
                onChange={(event) => setReason(event.target.value)}
                data-first
              />
            )}
          </Field>
        </div>
      </Dialog>
    </>
  );
}
