'use client';

import { useState, type FormEvent } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { formatMinutes } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';
import { StateTag } from '@/app/_components/ui/state-tag';
import { TextArea } from '@/app/_components/ui/text-area';
import { correctRemark, removeRemark, type Remark } from '@/lib/contracts/api/remark';
import { mayWork, withItem, withoutItem } from './night-log';
import { useNight } from './night-provider';
import { ReasonField } from './reason-field';

/** Free text in the log. Possible in a closed night as well: what is learnt in the morning belongs to it. */
export function RemarksPanel() {
  const { log, waiting } = useNight();
  const [corrected, setCorrected] = useState<Remark | null>(null);
  const remarks = log.remarks.toSorted((a, b) => Date.parse(b.utc) - Date.parse(a.utc));
  const onTheirWay = waiting.flatMap(({ key, outgoing, madeAt, refused }) =>
    outgoing.kind === 'remark' && refused === null ? [{ key, text: outgoing.body.text, madeAt }] : [],
  );
  const mayWrite = mayWork(log.may);
  return (
    <Panel title="Remarks" note={remarks.length === 0 ? undefined : String(remarks.length)}>
      {mayWrite ? <RemarkForm /> : null}
      {remarks.length === 0 && onTheirWay.length === 0 ? (
        <p className="text-ink-2">None yet. Whatever no field asks for belongs here.</p>
      ) : (
        <ul className="mt-3 grid gap-2.5">
          {onTheirWay.toReversed().map(({ key, text, madeAt }) => (
            <li key={key}>
              <span className="text-small text-ink-2">{formatMinutes(madeAt)}</span>{' '}
              <StateTag state="waiting to be sent" tone="warn" />
              <p className="whitespace-pre-wrap">{text}</p>
            </li>
          ))}
          {remarks.map((remark) => (
            <li key={remark.id}>
              <p className="flex items-baseline gap-2 text-small text-ink-2">
                <span className="font-mono">{formatMinutes(remark.utc)}</span>
                {remark.written_by}
                {mayWrite ? (
                  <button
                    type="button"
                    onClick={() => setCorrected(remark)}
                    className="ml-auto min-h-6 underline"
                  >
                    Correct<span className="sr-only"> the remark of {formatMinutes(remark.utc)}</span>
                  </button>
                ) : null}
              </p>
              <p className="wrap-anywhere whitespace-pre-wrap">{remark.text}</p>
            </li>
          ))}
        </ul>
      )}
      {corrected === null ? null : <CorrectRemark remark={corrected} onClose={() => setCorrected(null)} />}
    </Panel>
  );
}

function RemarkForm() {
  const { log, send } = useNight();
  const [text, setText] = useState('');
  const [error, setError] = useState<string | null>(null);
  const write = (event: FormEvent) => {
    event.preventDefault();
    if (text.trim() === '') return setError('is empty');
    // Now, where now is in the night; the time of sending could be hours later.
    const now = Date.now();
    const isNow = now >= Date.parse(log.night.starts_at) && now < Date.parse(log.night.ends_at);
    const utc = new Date(isNow ? now : Date.parse(log.night.ends_at) - 1).toISOString();
    send({ kind: 'remark', body: { utc, text: text.trim() } });
    setText('');
  };
  return (
    <form onSubmit={write} noValidate aria-label="Write a remark" className="flex items-end gap-2">
      <Field label="New remark" hideLabel error={error} className="flex-1">
        {(control) => (
          <TextArea
            {...control}
            rows={1}
            value={text}
            placeholder="Write a remark"
            maxLength={10_000}
            onChange={(event) => {
              setText(event.target.value);
              setError(null);
            }}
          />
        )}
      </Field>
      <Button type="submit">Add</Button>
    </form>
  );
}

function CorrectRemark({ remark, onClose }: { readonly remark: Remark; readonly onClose: () => void }) {
  const { log, change } = useNight();
  const [text, setText] = useState(remark.text);
  const [reason, setReason] = useState('');
  const { isBusy, refusal, run, refuse } = useApiCall();
  const params = { id: log.night.id, remark: remark.id };
  const correct = async () => {
    const done = await run(callApi(correctRemark, { params, body: { text } }));
    if (done === null) return;
    change((present) => ({ ...present, remarks: withItem(present.remarks, done.value) }));
    onClose();
  };
  const withdraw = async () => {
    if (reason.trim().length < 3) return refuse('Say in a few words why the remark is withdrawn.');
    const done = await run(callApi(removeRemark, { params, query: { reason: reason.trim() } }));
    if (done === null) return;
    change((present) => ({ ...present, remarks: withoutItem(present.remarks, remark.id) }));
    onClose();
  };
  return (
    <Dialog
      open
      onClose={onClose}
      title="Correct the remark"
      actions={
        <>
          <Button look="bad" busy={isBusy} onClick={() => void withdraw()}>
            Withdraw the remark
          </Button>
          <Button look="primary" busy={isBusy} busyLabel="Saving…" onClick={() => void correct()}>
            Save the correction
          </Button>
        </>
      }
    >
      <div className="grid gap-3">
        {refusal === null ? null : <ErrorNotice fault={refusal} />}
        <Field label="Text" required>
          {(control) => (
            <TextArea {...control} value={text} onChange={(event) => setText(event.target.value)} />
          )}
        </Field>
        <ReasonField
          value={reason}
          onChange={setReason}
          hint="Needed to withdraw; kept in the audit trail."
        />
      </div>
    </Dialog>
  );
}
