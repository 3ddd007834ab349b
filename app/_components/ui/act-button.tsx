'use client';

import {
  startTransition,
  useActionState,
  useEffect,
  useRef,
  useState,
  type FormEvent,
  type ReactNode,
} from 'react';
import type { ActionResult } from '@/lib/contracts/action-result';
import { Button, type ButtonLook } from './button';
import { Dialog } from './dialog';

interface ActButtonProps<T> {
  readonly action: (former: ActionResult<T> | null, form: FormData) => Promise<ActionResult<T>>;
  /** What the action needs to know. */
  readonly values: Readonly<Record<string, string>>;
  readonly children: ReactNode;
  /** The whole sentence for those who do not see the row that the button stands in. */
  readonly label?: string;
  readonly look?: ButtonLook;
  readonly busyLabel?: string;
  /** Asked before it is done. Without scripts it is done at once. */
  readonly confirm?: { readonly title: string; readonly text: ReactNode; readonly yes: string };
  readonly onDone?: (value: T) => void;
}

/** A button that does one thing on the server, says when it failed, and asks first where the thing cannot be undone. */
export function ActButton<T>(props: ActButtonProps<T>) {
  const { action, values, children, label, look, busyLabel, confirm, onDone } = props;
  const [result, send, isPending] = useActionState(action, null);
  const [isAsking, setAsking] = useState(false);
  const done = useRef(onDone);
  useEffect(() => {
    done.current = onDone;
  });
  useEffect(() => {
    if (result?.ok) done.current?.(result.value);
  }, [result]);
  const go = () => {
    const data = new FormData();
    for (const [name, value] of Object.entries(values)) data.append(name, value);
    setAsking(false);
    startTransition(() => send(data));
  };
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (confirm === undefined) go();
    else setAsking(true);
  };
  return (
    <form action={send} onSubmit={submit} className="inline-block">
      {Object.entries(values).map(([name, value]) => (
        <input key={name} type="hidden" name={name} value={value} />
      ))}
      <Button
        type="submit"
        aria-label={label}
        look={look ?? 'plain'}
        busy={isPending}
        busyLabel={busyLabel ?? '…'}
      >
        {children}
      </Button>
      {result !== null && !result.ok ? (
        <p role="alert" className="mt-1 max-w-60 text-small font-medium whitespace-normal text-bad">
          <span aria-hidden="true">✕ </span>
          {result.fault.detail}
        </p>
      ) : null}
      {confirm === undefined ? null : (
        <Dialog
          open={isAsking}
          onClose={() => setAsking(false)}
          title={confirm.title}
          actions={
            <Button look="bad" onClick={go}>
              {confirm.yes}
            </Button>
          }
        >
          <div className="whitespace-normal">{confirm.text}</div>
        </Dialog>
      )}
    </form>
  );
}
