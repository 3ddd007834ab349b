'use client';

import { useState } from 'react';
import { useShortcut } from '@/app/_components/hooks/use-shortcut';
import { Button } from '@/app/_components/ui/button';
import { formatDateInWords, formatInstant } from '@/app/_components/ui/format-time';
import { PageHead } from '@/app/_components/ui/page-head';
import { StateTag } from '@/app/_components/ui/state-tag';
import { AddConditionDialog } from './condition-dialog';
import { ManyFrames } from './many-frames';
import { mayWork } from './night-log';
import { AboutNightDialog, CloseNightDialog, ReopenNightDialog } from './night-dialogs';
import { useNight } from './night-provider';

type Shown = 'conditions' | 'about' | 'close' | 'reopen' | null;

function counts(frames: readonly { readonly type: string }[]): string {
  const standards = frames.filter(({ type }) => type === 'standard').length;
  if (frames.length === 0) return 'no frames yet';
  return `${frames.length} ${frames.length === 1 ? 'frame' : 'frames'}, ${standards} of standards`;
}

/** Which night this is, how it stands, and what one can do with it. */
export function NightHead() {
  const { log } = useNight();
  const { night, telescope, site, may } = log;
  const [shown, setShown] = useState<Shown>(null);
  const close = () => setShown(null);
  useShortcut('C', () => setShown('conditions'), may.log);
  const names = night.observers.map(({ name }) => name).join(', ');
  return (
    <>
      <PageHead
        title={formatDateInWords(night.date)}
        actions={
          <>
            {may.log ? (
              <Button shortcut="C" onClick={() => setShown('conditions')}>
                Add conditions
              </Button>
            ) : null}
            {may.log ? <ManyFrames /> : null}
            {mayWork(may) ? <Button onClick={() => setShown('about')}>Observers, account</Button> : null}
            {may.close ? <Button onClick={() => setShown('close')}>Close night</Button> : null}
            {may.reopen ? <Button onClick={() => setShown('reopen')}>Open again</Button> : null}
          </>
        }
      >
        <span className="text-ink-2">
          {telescope.name}, {site.name}
        </span>
        <StateTag state={night.state} />
        <span className="text-ink-2">
          {counts(log.frames)}
          {names === '' ? '' : `; ${names}`}
        </span>
      </PageHead>
      {night.summary === '' && night.reopened_reason === null && night.closed_at === null ? null : (
        <p className="mb-3 max-w-[110ch] whitespace-pre-wrap text-ink-2">
          {night.summary}
          {night.closed_at === null || night.state === 'open'
            ? ''
            : ` Closed by ${night.closed_by ?? ''}, ${formatInstant(night.closed_at)}.`}
          {night.reopened_reason === null ? '' : ` Opened again: ${night.reopened_reason}`}
        </p>
      )}
      {shown === 'conditions' ? <AddConditionDialog onClose={close} /> : null}
      {shown === 'about' ? <AboutNightDialog onClose={close} /> : null}
      {shown === 'close' ? <CloseNightDialog onClose={close} /> : null}
      {shown === 'reopen' ? <ReopenNightDialog onClose={close} /> : null}
    </>
  );
}
