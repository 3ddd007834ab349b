'use client';

import { useState, type ReactNode } from 'react';
import { ActionForm, type FormState } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import type { ActionResult } from '@/lib/contracts/action-result';

interface EditDialogProps<T> {
  readonly action: (former: ActionResult<T> | null, form: FormData) => Promise<ActionResult<T>>;
  readonly title: string;
  readonly button: string;
  /** The whole sentence for those who do not see what the button stands beside. */
  readonly buttonLabel: string;
  readonly hidden: Readonly<Record<string, string>>;
  readonly fields: readonly string[];
  readonly children: (state: FormState<T>) => ReactNode;
}

/** A button that opens a form, which closes when it is saved. */
export function EditDialog<T>(props: EditDialogProps<T>) {
  const { action, title, button, buttonLabel, hidden, fields, children } = props;
  const [isOpen, setOpen] = useState(false);
  const close = () => setOpen(false);
  return (
    <>
      <Button onClick={() => setOpen(true)} aria-label={buttonLabel}>
        {button}
      </Button>
      {isOpen ? (
        <Dialog open onClose={close} title={title}>
          <ActionForm action={action} fields={fields} label={title} onDone={close} className="grid gap-3">
            {(state) => (
              <>
                {Object.entries(hidden).map(([name, value]) => (
                  <input key={name} type="hidden" name={name} value={value} />
                ))}
                {children(state)}
                <div>
                  <Button type="submit" look="primary" busy={state.isPending} busyLabel="Saving…">
                    Save
                  </Button>
                </div>
              </>
            )}
          </ActionForm>
        </Dialog>
      ) : null}
    </>
  );
}
