'use client';

import { useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { Finding } from '@/app/_components/ui/finding';
import { TextArea } from '@/app/_components/ui/text-area';
import { patchNight, type Night, type PatchNight } from '@/lib/contracts/api/night';
import type { NightLog } from '@/lib/contracts/night-log';
import { mayIn } from './night-log';
import { useNight } from './night-provider';
import { ReasonField } from './reason-field';

interface Ending {
  readonly onClose: () => void;
}

const withNight = (log: NightLog, night: Night): NightLog => ({
  ...log,
  night,
  may: mayIn(log.may, night.state),
});

/** Changes the night itself, against the version that the person has read. */
function usePatch(onClose: () => void) {
  const { log, change, reload } = useNight();
  const { isBusy, refusal, run } = useApiCall();
  const patch = async (body: Omit<PatchNight, 'version'>) => {
    const { id, version } = log.night;
    const done = await run(callApi(patchNight, { params: { id }, body: { ...body, version } }));
    if (done === null) return void reload();
    change((present) => withNight(present, done.value));
    onClose();
  };
  return { isBusy, refusal, patch };
}

function Summary({
  value,
  onChange,
}: {
  readonly value: string;
  readonly onChange: (value: string) => void;
}) {
  return (
    <Field
      label="Account of the night"
      hint="Sky, instrument, what was done and what was not: it stands in the list of nights."
    >
      {(control) => (
        <TextArea
          {...control}
          value={value}
          onChange={(event) => onChange(event.target.value)}
          maxLength={10_000}
        />
      )}
    </Field>
  );
}

/** Closes the night with its account. What still waits must be sent before: a closed night takes no frames. */
export function CloseNightDialog({ onClose }: Ending) {
  const { log, waiting } = useNight();
  const [summary, setSummary] = useState(log.night.summary);
  const { isBusy, refusal, patch } = usePatch(onClose);
  return (
    <Dialog
      open
      onClose={onClose}
      title="Close the night"
      actions={
        <Button
          look="primary"
          busy={isBusy}
          busyLabel="Closing…"
          disabled={waiting.length > 0}
          onClick={() => void patch({ state: 'closed', summary })}
        >
          Close the night
        </Button>
      }
    >
      <div className="grid gap-3">
        {refusal === null ? null : <ErrorNotice fault={refusal} />}
        {waiting.length === 0 ? null : (
          <Finding tone="warn">
            {waiting.length === 1 ? 'One entry is' : `${waiting.length} entries are`} not with the server yet.
            A closed night takes no frames: let them be sent, or discard them, first.
          </Finding>
        )}
        <p>
          {log.frames.length} frames, {log.conditions.length} conditions entries. Measurements can be
          calibrated once the night is closed; it can be opened again with a reason.
        </p>
        <Summary value={summary} onChange={setSummary} />
      </div>
    </Dialog>
  );
}

export function ReopenNightDialog({ onClose }: Ending) {
  const { log } = useNight();
  const [reason, setReason] = useState('');
  const { isBusy, refusal, patch } = usePatch(onClose);
  return (
    <Dialog
      open
      onClose={onClose}
      title="Open the night again"
      actions={
        <Button
          look="primary"
          busy={isBusy}
          busyLabel="Opening…"
          onClick={() => void patch({ state: 'open', reason })}
        >
          Open it again
        </Button>
      }
    >
      <div className="grid gap-3">
        {refusal === null ? null : <ErrorNotice fault={refusal} />}
        {log.night.state === 'calibrated' ? (
          <Finding tone="warn">The night is calibrated: what changes now is not in its solution.</Finding>
        ) : null}
        <ReasonField
          value={reason}
          onChange={setReason}
          hint="Shown with the night, and kept in the audit trail."
        />
      </div>
    </Dialog>
  );
}

/** Who observed, and their account. */
export function AboutNightDialog({ onClose }: Ending) {
  const { log, observers } = useNight();
  const [summary, setSummary] = useState(log.night.summary);
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set(log.night.observers.map(({ id }) => id)));
  const { isBusy, refusal, patch } = usePatch(onClose);
  const choose = (id: string, isIn: boolean) =>
    setChosen((ids) => new Set(isIn ? [...ids, id] : [...ids].filter((one) => one !== id)));
  return (
    <Dialog
      open
      onClose={onClose}
      title="Observers and account"
      actions={
        <Button
          look="primary"
          busy={isBusy}
          busyLabel="Saving…"
          onClick={() => void patch({ summary, observers: [...chosen] })}
        >
          Save
        </Button>
      }
    >
      <div className="grid gap-3">
        {refusal === null ? null : <ErrorNotice fault={refusal} />}
        <fieldset>
          <legend className="mb-1 text-small text-ink-2">Observers: it is their night</legend>
          {observers.map(({ id, name }) => (
            <Checkbox
              key={id}
              label={name}
              checked={chosen.has(id)}
              onChange={(event) => choose(id, event.target.checked)}
            />
          ))}
        </fieldset>
        <Summary value={summary} onChange={setSummary} />
      </div>
    </Dialog>
  );
}
