'use client';

import { useCallback, useMemo, useState } from 'react';
import { useStretch } from '@/app/_components/hooks/use-stretch';
import { Button } from '@/app/_components/ui/button';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { DataTable, HeadCell } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import type { Frame } from '@/lib/contracts/api/frame';
import { CorrectFrameDialog } from './correct-frame-dialog';
import { FrameRow, WaitingRow } from './frame-row';
import { useWaitingFrames } from './log-line';
import { latestFirst } from './night-log';
import { useNight } from './night-provider';

/** Rows drawn at first: a night of thousands of frames would make every key slow. */
const firstRows = 150;

function Head({ hasActions }: { readonly hasActions: boolean }) {
  return (
    <tr>
      <HeadCell numeric>Frame</HeadCell>
      <HeadCell>Type</HeadCell>
      <HeadCell>Object</HeadCell>
      <HeadCell>Band</HeadCell>
      <HeadCell numeric unit="UTC">
        Mid-exposure
      </HeadCell>
      <HeadCell numeric unit="s">
        Exposure
      </HeadCell>
      <HeadCell numeric>Airmass</HeadCell>
      <HeadCell numeric unit="h">
        Hour angle
      </HeadCell>
      <HeadCell numeric unit="arcsec">
        FWHM
      </HeadCell>
      <HeadCell numeric unit="mag/arcsec²">
        Sky
      </HeadCell>
      <HeadCell>Programme</HeadCell>
      <HeadCell>Comment</HeadCell>
      {hasActions ? (
        <HeadCell>
          <span className="sr-only">Actions</span>
        </HeadCell>
      ) : null}
    </tr>
  );
}

/** Frames, the latest first; those of the selected stretch stand out, or stand alone. */
export function FrameTable() {
  const { log } = useNight();
  const waiting = useWaitingFrames();
  const [stretch] = useStretch();
  const [isOnly, setOnly] = useState(false);
  const [isAll, setAll] = useState(false);
  const [corrected, setCorrected] = useState<Frame | null>(null);
  const correct = useCallback((frame: Frame) => setCorrected(frame), []);
  const frames = useMemo(() => latestFirst(log.frames), [log.frames]);
  const isIn = ({ utc_mid }: Frame) => {
    const utc = Date.parse(utc_mid);
    return stretch !== null && utc >= stretch.from && utc < stretch.to;
  };
  const chosen = stretch !== null && isOnly ? frames.filter(isIn) : frames;
  const shown = isAll || stretch !== null ? chosen : chosen.slice(0, firstRows);
  const canCorrect = log.may.log;
  if (frames.length === 0 && waiting.length === 0) return <NoFrames mayLog={log.may.log} />;
  return (
    <>
      {stretch === null ? null : (
        <div className="border-b border-rule px-3.5 py-1.5">
          <Checkbox
            label={`Only the ${frames.filter(isIn).length} frames of the selected stretch`}
            checked={isOnly}
            onChange={(event) => setOnly(event.target.checked)}
          />
        </div>
      )}
      <DataTable caption="Frames, the latest first" head={<Head hasActions={canCorrect} />}>
        {waiting.toReversed().map((input) => (
          <WaitingRow key={`${input.number} ${input.utc_start}`} input={input} hasActions={canCorrect} />
        ))}
        {shown.map((frame) => (
          <FrameRow
            key={frame.id}
            frame={frame}
            isSelected={isIn(frame)}
            onCorrect={canCorrect ? correct : null}
          />
        ))}
      </DataTable>
      {shown.length < chosen.length ? (
        <div className="px-3.5 py-3">
          <Button onClick={() => setAll(true)}>Show all {chosen.length} frames</Button>
        </div>
      ) : null}
      <CorrectFrameDialog
        key={corrected?.id ?? 'none'}
        frame={corrected}
        onClose={() => setCorrected(null)}
      />
    </>
  );
}

function NoFrames({ mayLog }: { readonly mayLog: boolean }) {
  return (
    <EmptyState title="No frames yet">
      {mayLog
        ? 'Each exposure of the night is a line here. Log the first one above: Enter logs it, and the line goes on to the next.'
        : 'Frames appear here as the observers log them.'}
    </EmptyState>
  );
}
