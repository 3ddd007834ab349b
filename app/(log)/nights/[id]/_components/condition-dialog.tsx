'use client';

import { useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { formatClock, formatMinutes } from '@/app/_components/ui/format-time';
import { TextInput } from '@/app/_components/ui/text-input';
import { correctCondition, removeCondition, type Condition } from '@/lib/contracts/api/condition';
import { ConditionFields } from './condition-fields';
import {
  blankCondition,
  conditionLineOf,
  readCondition,
  type ConditionFaults,
  type ConditionField,
} from './condition-line';
import { withItem, withoutItem } from './night-log';
import { useNight } from './night-provider';

function useConditionLine(first: () => ReturnType<typeof conditionLineOf>) {
  const { log } = useNight();
  const [line, setLine] = useState(first);
  const [faults, setFaults] = useState<ConditionFaults>({});
  const set = (field: ConditionField, value: string) => {
    setLine((present) => ({ ...present, [field]: value }));
    setFaults(({ [field]: _mended, entry: _entry, ...others }) => others);
  };
  const read = () => {
    const result = readCondition(line, log.night);
    setFaults(result.ok ? {} : result.faults);
    return result.ok ? result.input : null;
  };
  return { line, faults, set, read };
}

/** What the sky is like now. The entry is kept and sent like a frame: a dead link loses none. */
export function AddConditionDialog({ onClose }: { readonly onClose: () => void }) {
  const { log, send } = useNight();
  const { line, faults, set, read } = useConditionLine(() => {
    const now = Date.now();
    const isNow = now >= Date.parse(log.night.starts_at) && now < Date.parse(log.night.ends_at);
    return { ...blankCondition, utc: isNow ? formatClock(now) : '' };
  });
  const add = () => {
    const body = read();
    if (body === null) return;
    send({ kind: 'condition', body });
    onClose();
  };
  return (
    <Dialog
      open
      wide
      onClose={onClose}
      title="Add conditions"
      actions={
        <Button look="primary" onClick={add}>
          Log the conditions
        </Button>
      }
    >
      {faults.entry === undefined ? null : (
        <div className="mb-3">
          <ErrorNotice fault={{ detail: faults.entry }} title="Nothing to log yet" />
        </div>
      )}
      <form
        noValidate
        aria-label="Conditions"
        onSubmit={(event) => {
          event.preventDefault();
          add();
        }}
      >
        <ConditionFields line={line} faults={faults} set={set} />
        <button type="submit" hidden>
          Log
        </button>
      </form>
    </Dialog>
  );
}

interface CorrectConditionProps {
  readonly entry: Condition;
  readonly onClose: () => void;
}

/** Corrects or withdraws an entry; what it said before stays in the audit trail. */
export function CorrectConditionDialog({ entry, onClose }: CorrectConditionProps) {
  const { log, change } = useNight();
  const { line, faults, set, read } = useConditionLine(() => conditionLineOf(entry));
  const [reason, setReason] = useState('');
  const { isBusy, refusal, run, refuse } = useApiCall();
  const params = { id: log.night.id, condition: entry.id };
  const correct = async () => {
    const body = read();
    if (body === null) return;
    const done = await run(callApi(correctCondition, { params, body }));
    if (done === null) return;
    change((present) => ({ ...present, conditions: withItem(present.conditions, done.value) }));
    onClose();
  };
  const withdraw = async () => {
    if (reason.trim().length < 3) return refuse('Say in a few words why the entry is withdrawn.');
    const done = await run(callApi(removeCondition, { params, query: { reason: reason.trim() } }));
    if (done === null) return;
    change((present) => ({ ...present, conditions: withoutItem(present.conditions, entry.id) }));
    onClose();
  };
  const wrong = refusal ?? (faults.entry === undefined ? null : { detail: faults.entry });
  return (
    <Dialog
      open
      wide
      onClose={onClose}
      title={`Correct the conditions of ${formatMinutes(entry.utc)} UTC`}
      actions={
        <>
          <Button look="bad" busy={isBusy} onClick={() => void withdraw()}>
            Withdraw the entry
          </Button>
          <Button look="primary" busy={isBusy} busyLabel="Saving…" onClick={() => void correct()}>
            Save the correction
          </Button>
        </>
      }
    >
      <div className="grid gap-3">
        {wrong === null ? null : <ErrorNotice fault={wrong} />}
        <ConditionFields line={line} faults={faults} set={set} />
        <Field label="Reason" hint="Needed to withdraw the entry; kept in the audit trail.">
          {(control) => (
            <TextInput {...control} value={reason} onChange={(event) => setReason(event.target.value)} />
          )}
        </Field>
      </div>
    </Dialog>
  );
}
