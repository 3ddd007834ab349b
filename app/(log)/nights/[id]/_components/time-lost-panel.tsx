'use client';

import { useState, type FormEvent } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { formatDuration } from '@/app/_components/ui/format-time';
import { NumberInput } from '@/app/_components/ui/number-input';
import { Panel } from '@/app/_components/ui/panel';
import { Select } from '@/app/_components/ui/select';
import { TextInput } from '@/app/_components/ui/text-input';
import {
  LossCause,
  lossCauses,
  removeTimeLoss,
  TimeLossInput,
  type TimeLoss,
} from '@/lib/contracts/api/time-loss';
import { mayWork, withoutItem } from './night-log';
import { useNight } from './night-provider';
import { ReasonField } from './reason-field';

const causeChoices = lossCauses.map((value) => ({ value, label: value }));

/** Observing time lost, and to what. */
export function TimeLostPanel() {
  const { log } = useNight();
  const [isAdding, setAdding] = useState(false);
  const [withdrawn, setWithdrawn] = useState<TimeLoss | null>(null);
  const mayWrite = mayWork(log.may);
  return (
    <Panel
      title="Time lost"
      actions={mayWrite ? <Button onClick={() => setAdding(true)}>Add</Button> : undefined}
    >
      {log.timeLosses.length === 0 ? (
        <p className="text-ink-2">None recorded.</p>
      ) : (
        <ul className="grid gap-1 text-table">
          {log.timeLosses.map((loss) => (
            <li key={loss.id} className="flex items-baseline gap-2">
              <span className="font-mono whitespace-nowrap">{formatDuration(loss.minutes)}</span>
              <span>
                {loss.cause}
                {loss.comment === '' ? null : <span className="text-ink-2">, {loss.comment}</span>}
              </span>
              {mayWrite ? (
                <button
                  type="button"
                  onClick={() => setWithdrawn(loss)}
                  className="ml-auto min-h-6 text-small text-ink-2 underline"
                >
                  Withdraw
                  <span className="sr-only">
                    {' '}
                    {formatDuration(loss.minutes)} {loss.cause}
                  </span>
                </button>
              ) : null}
            </li>
          ))}
        </ul>
      )}
      {isAdding ? <AddLoss onClose={() => setAdding(false)} /> : null}
      {withdrawn === null ? null : <WithdrawLoss loss={withdrawn} onClose={() => setWithdrawn(null)} />}
    </Panel>
  );
}

function AddLoss({ onClose }: { readonly onClose: () => void }) {
  const { send } = useNight();
  const [cause, setCause] = useState<string>(lossCauses[0]);
  const [minutes, setMinutes] = useState('');
  const [comment, setComment] = useState('');
  const [error, setError] = useState<string | null>(null);
  const add = (event?: FormEvent) => {
    event?.preventDefault();
    const typed = minutes.trim();
    const parsed = TimeLossInput.safeParse({
      cause: LossCause.safeParse(cause).data,
      minutes: /^\d+$/.test(typed) ? Number(typed) : Number.NaN,
      comment,
    });
    if (!parsed.success) {
      const found = parsed.error.issues[0]?.message;
      return setError(/^\d+$/.test(typed) ? (found ?? null) : 'is not a whole number of minutes');
    }
    send({ kind: 'time-loss', body: parsed.data });
    onClose();
  };
  return (
    <Dialog
      open
      onClose={onClose}
      title="Add time lost"
      actions={
        <Button look="primary" onClick={() => add()}>
          Record it
        </Button>
      }
    >
      <form onSubmit={add} noValidate className="grid gap-3" aria-label="Time lost">
        <Field label="Minutes" required error={error}>
          {(control) => (
            <NumberInput
              {...control}
              data-first
              value={minutes}
              onChange={(event) => {
                setMinutes(event.target.value);
                setError(null);
              }}
            />
          )}
        </Field>
        <Field label="Cause" required>
          {(control) => (
            <Select
              {...control}
              value={cause}
              onChange={(event) => setCause(event.target.value)}
              choices={causeChoices}
            />
          )}
        </Field>
        <Field label="Comment">
          {(control) => (
            <TextInput
              {...control}
              value={comment}
              maxLength={500}
              onChange={(event) => setComment(event.target.value)}
            />
          )}
        </Field>
        <button type="submit" hidden>
          Record
        </button>
      </form>
    </Dialog>
  );
}

function WithdrawLoss({ loss, onClose }: { readonly loss: TimeLoss; readonly onClose: () => void }) {
  const { log, change } = useNight();
  const [reason, setReason] = useState('');
  const { isBusy, refusal, run, refuse } = useApiCall();
  const withdraw = async () => {
    if (reason.trim().length < 3) return refuse('Say in a few words why the entry is withdrawn.');
    const params = { id: log.night.id, loss: loss.id };
    const done = await run(callApi(removeTimeLoss, { params, query: { reason: reason.trim() } }));
    if (done === null) return;
    change((present) => ({ ...present, timeLosses: withoutItem(present.timeLosses, loss.id) }));
    onClose();
  };
  return (
    <Dialog
      open
      onClose={onClose}
      title={`Withdraw ${formatDuration(loss.minutes)}, ${loss.cause}`}
      actions={
        <Button look="bad" busy={isBusy} onClick={() => void withdraw()}>
          Withdraw the entry
        </Button>
      }
    >
      <div className="grid gap-3">
        {refusal === null ? null : <ErrorNotice fault={refusal} />}
        <ReasonField value={reason} onChange={setReason} hint="Kept in the audit trail." />
      </div>
    </Dialog>
  );
}
