'use client';

import { useRef, useState, type DragEvent } from 'react';
import { Button } from '@/app/_components/ui/button';
import { classNames } from '@/app/_components/ui/class-names';
import { formatBytes } from '@/lib/contracts/format-figure';

interface FileDropProps {
  readonly file: File | null;
  readonly disabled: boolean;
  readonly error: string | null;
  readonly onFile: (file: File) => void;
}

/** Drop a file, or choose one. Only the first of several counts, and the form says which. */
export function FileDrop({ file, disabled, error, onFile }: FileDropProps) {
  const input = useRef<HTMLInputElement>(null);
  const [isOver, setOver] = useState(false);
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    const [dropped] = event.dataTransfer.files;
    if (dropped && !disabled) onFile(dropped);
  };
  return (
    <div
      onDragOver={(event) => {
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={drop}
      className={classNames(
        'flex min-h-28 flex-col items-center justify-center gap-2 rounded-control border border-dashed px-4 py-4 text-center',
        isOver ? 'border-accent bg-accent-wash' : 'border-edge bg-sunk',
        error !== null && 'border-bad',
      )}
    >
      {file === null ? (
        <p className="text-ink-2">Drop a CSV table here, or</p>
      ) : (
        <p className="max-w-full">
          <b className="font-mono font-medium wrap-anywhere">{file.name}</b>{' '}
          <span className="whitespace-nowrap text-ink-2">{formatBytes(file.size)}</span>
        </p>
      )}
      <Button disabled={disabled} onClick={() => input.current?.click()} aria-describedby="file-error">
        {file === null ? 'Choose a file' : 'Choose another'}
      </Button>
      <input
        ref={input}
        type="file"
        accept=".csv,.txt,text/csv"
        aria-label="File of the table"
        tabIndex={-1}
        className="sr-only"
        disabled={disabled}
        onChange={(event) => {
          const [chosen] = event.target.files ?? [];
          if (chosen) onFile(chosen);
          // Choosing the same file again, after it was mended, is a choice too.
          event.target.value = '';
        }}
      />
      <p id="file-error" role="alert" className="text-small font-medium text-bad empty:hidden">
        {error}
      </p>
    </div>
  );
}
