'use client';

import type { Route } from 'next';
import Link from 'next/link';
import { useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';
import { correctFrame, removeFrame, type Frame } from '@/lib/contracts/api/frame';
import { auditAddress } from '@/lib/contracts/audit';
import { faultsOf, lineOf, readLine, type LineFaults, type LineField } from './frame-line';
import { frameChange } from './frame-patch';
import { LineFields } from './line-fields';
import { MoreFields } from './more-fields';
import { withItem, withoutItem } from './night-log';
import { useNight } from './night-provider';

/** What the dialogue knows and does: the line over the frame, its faults, and the two ends it can come to. */
function useCorrection(frame: Frame, onClose: () => void) {
  const { log, change, reload } = useNight();
  const [line, setLine] = useState(lineOf(frame));
  const [faults, setFaults] = useState<LineFaults>({});
  const [reason, setReason] = useState('');
  const { isBusy, refusal, run, refuse } = useApiCall();
  const params = { id: log.night.id, frame: frame.id };
  const why = reason.trim();

  const correct = async () => {
    const read = readLine(line, { night: log.night, telescope: log.telescope, now: null });
    setFaults(read.ok ? {} : read.faults);
    if (!read.ok) return;
    const difference = frameChange(frame, read.input);
    if (Object.keys(difference).length === 0) return onClose();
    const body = { ...difference, version: frame.version, ...(why === '' ? {} : { reason: why }) };
    const done = await run(callApi(correctFrame, { params, body }));
    // Somebody else may have corrected it meanwhile: the table behind shows how it stands now.
    if (done === null) return void reload();
    change((present) => ({ ...present, frames: withItem(present.frames, done.value) }));
    onClose();
  };
  const withdraw = async () => {
    if (why.length < 3) {
      return refuse('Say in a few words why the frame is withdrawn; the reason is kept with it.');
    }
    const done = await run(callApi(removeFrame, { params, query: { reason: why } }));
    if (done === null) return;
    change((present) => ({ ...present, frames: withoutItem(present.frames, frame.id) }));
    onClose();
  };
  const set = (field: LineField, value: string) => {
    setLine((present) => ({ ...present, [field]: value }));
    setFaults(({ [field]: _mended, ...others }) => others);
  };
  const shown = { ...faultsOf(refusal?.issues ?? []), ...faults };
  return {
    state: { line, faults: shown, set, isNow: false },
    reason,
    setReason,
    refusal,
    isBusy,
    correct,
    withdraw,
  };
}

/** Corrects a frame in place, or withdraws it; what it said before stays in the audit trail. */
export function CorrectFrameDialog({
  frame,
  onClose,
}: {
  readonly frame: Frame | null;
  readonly onClose: () => void;
}) {
  return frame === null ? null : <Open frame={frame} onClose={onClose} />;
}

function Open({ frame, onClose }: { readonly frame: Frame; readonly onClose: () => void }) {
  const { state, reason, setReason, refusal, isBusy, correct, withdraw } = useCorrection(frame, onClose);
  return (
    <Dialog
      open
      wide
      onClose={onClose}
      title={`Correct frame ${frame.number}`}
      actions={
        <>
          <Button look="bad" busy={isBusy} onClick={() => void withdraw()}>
            Withdraw the frame
          </Button>
          <Button look="primary" busy={isBusy} busyLabel="Saving…" onClick={() => void correct()}>
            Save the correction
          </Button>
        </>
      }
    >
      {refusal === null ? null : (
        <div className="mb-3">
          <ErrorNotice fault={refusal} />
        </div>
      )}
      <form
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          void correct();
        }}
        aria-label={`Frame ${frame.number}`}
        className="grid grid-cols-2 items-start gap-2 sm:grid-cols-4"
      >
        <LineFields state={state} now={0} />
        <MoreFields state={state} />
        <Field
          label="Reason"
          hint="Kept with the earlier values in the audit trail; needed to withdraw a frame."
          className="col-span-full"
        >
          {(control) => (
            <TextInput
              {...control}
              value={reason}
              onChange={(event) => setReason(event.target.value)}
              maxLength={500}
            />
          )}
        </Field>
        <p className="col-span-full text-small">
          <Link href={auditAddress({ about: 'frame', subject: frame.id }, {}) as Route}>
            What it said before
          </Link>
        </p>
        <button type="submit" hidden>
          Save
        </button>
      </form>
    </Dialog>
  );
}
