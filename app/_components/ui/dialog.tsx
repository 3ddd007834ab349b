'use client';

import { useEffect, useId, useRef, type ReactNode } from 'react';
import { Button } from './button';

interface DialogProps {
  readonly open: boolean;
  /** Called by Esc, by the closing button and by nothing else. */
  readonly onClose: () => void;
  readonly title: ReactNode;
  readonly children: ReactNode;
  /** Buttons that end it, beside Cancel. */
  readonly actions?: ReactNode;
  readonly closeLabel?: string;
  readonly wide?: boolean;
}

/** The browser's own modal dialogue: it keeps focus inside, gives it back after, and closes on Esc. */
export function Dialog({
  open,
  onClose,
  title,
  children,
  actions,
  closeLabel = 'Cancel',
  wide = false,
}: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (dialog === null) return;
    if (open && !dialog.open) {
      dialog.showModal();
      // The browser's own choice is the first field; some forms begin at another.
      const first = dialog.querySelector<HTMLInputElement>('input[data-first]');
      first?.focus();
      first?.select();
    }
    if (!open && dialog.open) dialog.close();
  }, [open]);
  return (
    <dialog
      ref={ref}
      aria-labelledby={titleId}
      onClose={onClose}
      className={`m-auto max-h-[calc(100dvh-2rem)] w-[calc(100vw-2rem)] overflow-auto rounded-panel border border-edge bg-sheet p-0 ${wide ? 'max-w-4xl' : 'max-w-xl'}`}
    >
      {open ? (
        <>
          <h2 id={titleId} className="border-b border-rule px-4 py-3 text-lead font-medium">
            {title}
          </h2>
          <div className="px-4 py-4">{children}</div>
          <div className="flex flex-wrap justify-end gap-2 border-t border-rule px-4 py-3">
            <Button onClick={onClose}>{closeLabel}</Button>
            {actions}
          </div>
        </>
      ) : null}
    </dialog>
  );
}
