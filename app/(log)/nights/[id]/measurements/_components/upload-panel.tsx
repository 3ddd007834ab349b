'use client';

import Link from 'next/link';
import type { Route } from 'next';
import { useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { Button } from '@/app/_components/ui/button';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { formatBytes } from '@/lib/contracts/format-figure';
import { Panel } from '@/app/_components/ui/panel';
import { ProgressBar } from '@/app/_components/ui/progress-bar';
import { saveColumnMapping, type SavedMapping } from '@/lib/contracts/api/measurement-set';
import { tolerances } from '@/lib/contracts/measurement-kinds';
import { FileDrop } from './file-drop';
import { MappingForm } from './mapping-form';
import { SetFields, type SetValues } from './set-fields';
import { isComplete, useColumns, type Columns } from './use-columns';
import { useUpload, type UploadState } from './use-upload';

interface UploadPanelProps {
  readonly night: string;
  readonly telescope: string;
  readonly mappings: readonly SavedMapping[];
  readonly limit_bytes: number;
  /** A table has been taken, or a mapping saved. */
  readonly onChange: () => void;
}

const usual: SetValues = { kind: 'mixed', name: '', tolerance: String(tolerances.usual) };

/** Takes a measurement table: file, kind, name, tolerance; columns where the file names them otherwise. */
export function UploadPanel({ night, telescope, mappings, limit_bytes, onChange }: UploadPanelProps) {
  const [values, setValues] = useState(usual);
  const [fileError, setFileError] = useState<string | null>(null);
  const { columns, choose, change, clear } = useColumns(mappings);
  const { state, upload, clear: clearFailure } = useUpload();
  const isSending = state.kind === 'sending';
  const toleranceError = toleranceFault(values.tolerance);

  const onFile = async (file: File) => {
    clearFailure();
    setFileError(sizeFault(file, limit_bytes));
    await choose(file);
  };
  const submit = async () => {
    if (columns === null) return setFileError('Choose a file first.');
    if (fileError !== null || toleranceError !== null) return;
    if (!isComplete(columns)) return change({ isShown: true });
    if (columns.isShown && columns.isRemembered && columns.head !== null) await remember(night, columns);
    const { file, mapping } = columns;
    const queued = await upload({ night, file, mapping, ...values });
    if (queued === null) return;
    clear();
    setValues({ ...values, name: '' });
    onChange();
  };
  return (
    <Panel title="Upload a table" note={`CSV, UTF-8, up to ${formatBytes(limit_bytes)}`}>
      <form
        noValidate
        aria-label="Upload a measurement table"
        aria-busy={isSending || undefined}
        onSubmit={(event) => {
          event.preventDefault();
          void submit();
        }}
        className="grid grid-cols-1 gap-4"
      >
        <div className="grid grid-cols-1 items-start gap-4 lg:grid-cols-[minmax(0,1fr)_minmax(0,1.4fr)]">
          <FileDrop
            file={columns?.file ?? null}
            disabled={isSending}
            error={fileError}
            onFile={(file) => void onFile(file)}
          />
          <SetFields
            values={values}
            disabled={isSending}
            toleranceError={toleranceError}
            onValues={setValues}
          />
        </div>
        <ColumnWords columns={columns} onShow={() => change({ isShown: true })} />
        {columns?.isShown === true && columns.head !== null ? (
          <MappingForm
            head={columns.head}
            mapping={columns.mapping}
            telescope={telescope}
            isRemembered={columns.isRemembered}
            onMapping={(mapping) => change({ mapping, savedBy: null })}
            onRemember={(isRemembered) => change({ isRemembered })}
          />
        ) : null}
        <UploadProgress state={state} />
        <div className="flex flex-wrap items-center gap-2">
          <Button type="submit" look="primary" busy={isSending} busyLabel="Uploading …">
            Upload
          </Button>
          {isSending ? <Button onClick={state.stop}>Stop</Button> : null}
          <span className="text-small text-ink-2">
            It is checked line by line and taken whole or not at all.
          </span>
        </div>
      </form>
    </Panel>
  );
}

/** Keeps the mapping for the next table of this kind. That it could not be kept is no reason not to upload. */
async function remember(night: string, { head, mapping }: Columns): Promise<void> {
  await callApi(saveColumnMapping, {
    params: { id: night },
    body: { headers: [...(head?.headers ?? [])], mapping },
  });
}

function sizeFault(file: File, limit_bytes: number): string | null {
  if (file.size === 0) return 'This file is empty.';
  if (file.size <= limit_bytes) return null;
  return `This file has ${formatBytes(file.size)}; at most ${formatBytes(limit_bytes)} are taken.`;
}

function toleranceFault(text: string): string | null {
  const { smallest, largest } = tolerances;
  const value = Number(text);
  if (text.trim() !== '' && value >= smallest && value <= largest) return null;
  return `Write a number of arcseconds from ${smallest} to ${largest}.`;
}

interface ColumnWordsProps {
  readonly columns: Columns | null;
  readonly onShow: () => void;
}

/** How the chosen file will be read, in one line, and the way to say it otherwise. */
function ColumnWords({ columns, onShow }: ColumnWordsProps) {
  if (columns === null || columns.isShown || columns.head === null) return null;
  const { head, savedBy } = columns;
  return (
    <p className="flex flex-wrap items-center gap-x-3 gap-y-1 text-table">
      <span>
        {head.headers.length} columns,{' '}
        {savedBy === null
          ? 'named as a table should name them.'
          : `read as ${savedBy} said of tables like this.`}
      </span>
      <Button look="quiet" onClick={onShow}>
        Name the columns otherwise
      </Button>
    </p>
  );
}

function UploadProgress({ state }: { readonly state: UploadState }) {
  if (state.kind === 'idle') return null;
  if (state.kind === 'sending') {
    const { sent, size } = state;
    const isSent = sent >= size;
    return (
      <ProgressBar
        value={size === 0 ? null : sent / size}
        label={isSent ? 'Keeping it' : 'Sending the table'}
        left={`${formatBytes(Math.min(sent, size))} of ${formatBytes(size)}`}
      />
    );
  }
  if (state.kind === 'taken') {
    return (
      <p role="status" className="text-table">
        <Link href={`/measurement-sets/${state.set}` as Route}>{state.name}</Link> is with the server and
        being checked; you may leave this page.
      </p>
    );
  }
  const { refusal } = state;
  const earlier = refusal.issues.find(({ path }) => path === 'set')?.value;
  return (
    <ErrorNotice
      title="The table was not taken"
      fault={{ ...refusal, issues: refusal.issues.filter(({ path }) => path !== 'set') }}
      {...(earlier === undefined
        ? {}
        : {
            action: (
              <Link href={`/measurement-sets/${earlier}` as Route}>Open the set that has these bytes</Link>
            ),
          })}
    />
  );
}
