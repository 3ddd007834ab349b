'use client';

import { useEffect, useRef, type ChangeEvent, type DragEvent } from 'react';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { Field } from '@/app/_components/ui/field';
import { Finding } from '@/app/_components/ui/finding';
import { formatCount } from '@/lib/contracts/format-figure';
import { ProgressBar } from '@/app/_components/ui/progress-bar';
import { TextArea } from '@/app/_components/ui/text-area';
import { CheckedTable } from './checked-table';
import { useFrameList } from './use-frame-list';

interface ManyFramesDialogProps {
  /** Files that were dropped on the page to open it. */
  readonly dropped: readonly File[];
  readonly onClose: () => void;
}

const example = 'number,type,object,band,start,exposure\n48,standard,SA 95,B,23:41:05,40';

/** Many frames at once: a pasted table, or the headers of FITS files, looked over before all or none is logged. */
export function ManyFramesDialog({ dropped, onClose }: ManyFramesDialogProps) {
  const list = useFrameList(onClose);
  const { text, type, headers, checked, problems, good, wrong, fault, isTooMany } = list;
  const first = useRef(headers.take);
  useEffect(() => {
    if (dropped.length > 0) void first.current(dropped);
  }, [dropped]);
  const drop = (event: DragEvent) => {
    event.preventDefault();
    void headers.take([...event.dataTransfer.files]);
  };
  return (
    <Dialog
      open
      wide
      onClose={onClose}
      title="Log many frames"
      closeLabel="Close"
      actions={
        <Button
          look="primary"
          busy={list.isBusy}
          busyLabel="Logging…"
          disabled={!list.canLog}
          onClick={() => void list.logAll()}
        >
          {good.length === 0 ? 'Log them' : `Log ${formatCount(good.length)} frames`}
        </Button>
      }
    >
      <div className="grid gap-3" onDragOver={(event) => event.preventDefault()} onDrop={drop}>
        {fault === null ? null : <ErrorNotice fault={fault} />}
        <HeaderFiles headers={headers} />
        <Field
          label="Table of frames"
          hint="Comma, semicolon or tab between the columns: number, type, object, band, start, exposure, comment, file, programme, ra, dec, fwhm, sky. A header line may name fewer, in any order."
        >
          {(control) => (
            <TextArea
              {...control}
              mono
              rows={5}
              spellCheck={false}
              placeholder={example}
              value={text}
              onChange={(event) => type(event.target.value)}
              className="max-h-60 overflow-auto whitespace-pre"
            />
          )}
        </Field>
        {problems.map((problem) => (
          <Finding key={problem} tone="warn">
            {problem}
          </Finding>
        ))}
        {isTooMany ? <Finding tone="bad">At most 5,000 frames can be logged at once.</Finding> : null}
        {checked.length === 0 ? null : <Looked checked={checked} wrong={wrong} />}
      </div>
    </Dialog>
  );
}

type FrameList = ReturnType<typeof useFrameList>;

/** FITS files, picked or dropped: how far reading them is, and which could not be read. */
function HeaderFiles({ headers }: { readonly headers: FrameList['headers'] }) {
  const picker = useRef<HTMLInputElement>(null);
  const pick = (event: ChangeEvent<HTMLInputElement>) => void headers.take([...(event.target.files ?? [])]);
  const { progress, unread } = headers;
  return (
    <>
      <div className="flex flex-wrap items-center gap-3">
        <input
          ref={picker}
          type="file"
          multiple
          accept=".fits,.fit,.fts"
          onChange={pick}
          className="sr-only"
          tabIndex={-1}
          aria-label="FITS files"
        />
        <Button onClick={() => picker.current?.click()}>Read FITS headers</Button>
        <span className="text-small text-ink-2">
          or drop files here. Only their headers are read, and in this browser: no pixel leaves it.
        </span>
      </div>
      {progress === null ? null : (
        <ProgressBar
          label="Reading headers"
          value={progress.done / progress.of}
          left={`${progress.of - progress.done} left`}
        />
      )}
      {unread.length === 0 ? null : (
        <Finding tone="warn">
          {unread.slice(0, 5).join('; ')}
          {unread.length > 5 ? `; and ${unread.length - 5} more` : ''}
        </Finding>
      )}
    </>
  );
}

/** The list, line by line, with what is wrong. */
function Looked({ checked, wrong }: Pick<FrameList, 'checked' | 'wrong'>) {
  const verdict =
    wrong === 0
      ? `${formatCount(checked.length)} frames, nothing wrong.`
      : `${formatCount(wrong)} of ${formatCount(checked.length)} lines have faults. Mend them in the table above: all are logged, or none.`;
  return (
    <div>
      <p role="status" className="mb-1">
        {verdict}
      </p>
      <div className="rounded-panel border border-rule">
        <CheckedTable lines={checked} />
      </div>
    </div>
  );
}
