'use client';

import { useEffect, useState } from 'react';
import { useShortcut } from '@/app/_components/hooks/use-shortcut';
import { Button } from '@/app/_components/ui/button';
import { ManyFramesDialog } from './many-frames-dialog';

const none: readonly File[] = [];

/** Many frames at once, by a button, by a key, or by dropping FITS files anywhere on the page. */
export function ManyFrames() {
  const [isOpen, setOpen] = useState(false);
  const [dropped, setDropped] = useState<readonly File[]>(none);
  useShortcut('F', () => setOpen(true));
  useEffect(() => {
    const over = (event: globalThis.DragEvent) => {
      if (event.dataTransfer?.types.includes('Files') === true) event.preventDefault();
    };
    const drop = (event: globalThis.DragEvent) => {
      if (event.defaultPrevented || event.dataTransfer === null || event.dataTransfer.files.length === 0)
        return;
      event.preventDefault();
      setDropped([...event.dataTransfer.files]);
      setOpen(true);
    };
    document.addEventListener('dragover', over);
    document.addEventListener('drop', drop);
    return () => {
      document.removeEventListener('dragover', over);
      document.removeEventListener('drop', drop);
    };
  }, []);
  return (
    <>
      <Button shortcut="F" onClick={() => setOpen(true)}>
        Many, or FITS files
      </Button>
      {isOpen ? (
        <ManyFramesDialog
          dropped={dropped}
          onClose={() => {
            setOpen(false);
            setDropped(none);
          }}
        />
      ) : null}
    </>
  );
}
