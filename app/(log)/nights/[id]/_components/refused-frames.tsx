'use client';

import { Button } from '@/app/_components/ui/button';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { useLogQueue } from '../../../_components/queue/log-queue';
import { entryWords } from '../../../_components/queue/queue-entry';
import { faultsOf, lineOf, type FrameLine, type LineFaults } from './frame-line';
import { useNight } from './night-provider';

interface RefusedFramesProps {
  readonly onPutBack: (line: FrameLine, faults: LineFaults) => void;
}

/** Frames that the server would not have, with its reasons; each can go back into the line and be mended. */
export function RefusedFrames({ onPutBack }: RefusedFramesProps) {
  const { waiting } = useNight();
  const { discard } = useLogQueue();
  return waiting.map((entry) => {
    const { key, outgoing, refused } = entry;
    if (outgoing.kind !== 'frame' || refused === null) return null;
    return (
      <div key={key} className="mb-3">
        <ErrorNotice
          title={`Not logged: ${entryWords(entry)}`}
          fault={refused}
          action={
            <span className="flex gap-2">
              <Button
                onClick={() => {
                  onPutBack(lineOf(outgoing.body), faultsOf(refused.issues));
                  discard(key);
                }}
              >
                Put back into the line
              </Button>
              <Button look="quiet" onClick={() => discard(key)}>
                Discard
              </Button>
            </span>
          }
        />
      </div>
    );
  });
}
