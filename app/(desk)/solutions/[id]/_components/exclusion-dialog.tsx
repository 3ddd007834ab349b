'use client';

import type { Route } from 'next';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';
import { changeExclusions } from '@/lib/contracts/api/solution';

interface ExclusionDialogProps {
  readonly solution: string;
  readonly observations: readonly string[];
  /** Which observations they are, in words. */
  readonly words: string;
  /** Keeps them in, instead of out. */
  readonly restore: boolean;
  readonly onClose: () => void;
}

/** Keeps observations out of the fit or in it, with a reason: a new draft is solved, and its page follows. */
export function ExclusionDialog({ solution, observations, words, restore, onClose }: ExclusionDialogProps) {
  const router = useRouter();
  const [reason, setReason] = useState('');
  const [error, setError] = useState<string | null>(null);
  const { isBusy, refusal, run } = useApiCall();
  const send = async () => {
    if (reason.trim().length < 3) {
      return setError('Say why, in a few words; the reason stands beside each observation.');
    }
    setError(null);
    const body = { observations: [...observations], reason, restore };
    const done = await run(callApi(changeExclusions, { params: { id: solution }, body }));
    if (done === null) return;
    onClose();
    router.push(`/solutions/${done.value.solution}` as Route);
  };
  const count = observations.length === 1 ? 'the observation' : `${observations.length} observations`;
  return (
    <Dialog
      open
      onClose={onClose}
      title={restore ? `Restore ${count}` : `Reject ${count}`}
      actions={
        <Button look="primary" busy={isBusy} busyLabel="Queueing …" onClick={() => void send()}>
          {restore ? 'Restore and solve again' : 'Reject and solve again'}
        </Button>
      }
    >
      <form
        noValidate
        className="grid gap-3"
        onSubmit={(event) => {
          event.preventDefault();
          void send();
        }}
      >
        {refusal === null ? null : <ErrorNotice fault={refusal} />}
        <p>
          {words}.{' '}
          {restore ? 'They are kept in, whatever the fit thinks of them.' : 'They are left out of the fit.'}{' '}
          This solution stays as it is: a new draft is solved with the change.
        </p>
        <Field label="Why" required error={error}>
          {(control) => (
            <TextInput
              {...control}
              value={reason}
              maxLength={500}
              onChange={(event) => setReason(event.target.value)}
              data-first
            />
          )}
        </Field>
      </form>
    </Dialog>
  );
}
