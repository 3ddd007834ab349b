'use client';

import { startTransition, useActionState, useEffect, useRef, type FormEvent, type ReactNode } from 'react';
import type { ActionResult } from '@/lib/contracts/action-result';
import { ErrorNotice } from './error-notice';

/** What a form's content needs to know of its last sending. */
export interface FormState<T> {
  readonly result: ActionResult<T> | null;
  readonly isPending: boolean;
  /** What is wrong with a field, as one sentence each. */
  readonly issue: (path: string) => string | undefined;
  /** What was typed into a field before the page was made anew; matters only without scripts. */
  readonly typed: (name: string, otherwise?: string) => string;
}

interface ActionFormProps<T> {
  readonly action: (former: ActionResult<T> | null, form: FormData) => Promise<ActionResult<T>>;
  readonly children: (state: FormState<T>) => ReactNode;
  /** Called once after each success. */
  readonly onDone?: (value: T) => void;
  /** Empties the fields after a success: for forms that add one thing after the other. */
  readonly resets?: boolean;
  /** Paths whose issues stand beside their fields; those of others are listed above. */
  readonly fields: readonly string[];
  readonly label?: string;
  readonly className?: string;
}

/**
 * A form that sends to a server action, with scripts and without. It keeps what was typed over a refusal: left to itself
 * React empties a form after every sending. Focus goes to the notice that says what was wrong.
 */
export function ActionForm<T>(props: ActionFormProps<T>) {
  const { action, children, onDone, resets = false, fields, label, className } = props;
  const [result, send, isPending] = useActionState(action, null);
  const form = useRef<HTMLFormElement>(null);
  const notice = useRef<HTMLDivElement>(null);
  const done = useRef(onDone);
  useEffect(() => {
    done.current = onDone;
  });
  useEffect(() => {
    if (result === null) return;
    if (!result.ok) {
      notice.current?.focus();
      return;
    }
    if (resets) form.current?.reset();
    done.current?.(result.value);
  }, [result, resets]);
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (isPending) return;
    const data = new FormData(event.currentTarget, (event.nativeEvent as SubmitEvent).submitter);
    startTransition(() => send(data));
  };
  const fault = result !== null && !result.ok ? result.fault : null;
  const elsewhere = fault?.issues.filter(({ path }) => !fields.includes(path)) ?? [];
  return (
    <form
      ref={form}
      action={send}
      onSubmit={submit}
      noValidate
      aria-label={label}
      aria-busy={isPending || undefined}
      className={className}
    >
      {fault === null ? null : (
        <div className="mb-3">
          <ErrorNotice
            ref={notice}
            fault={{
              detail: fault.detail,
              issues: elsewhere,
              reference: fault.code === 'bug' ? fault.reference : undefined,
            }}
          />
        </div>
      )}
      {children({
        result,
        isPending,
        issue: (path) => {
          const found = fault?.issues.filter((one) => one.path === path).map(({ message }) => message) ?? [];
          return found.length === 0 ? undefined : found.join(' ');
        },
        typed: (name, otherwise = '') => fault?.typed[name] ?? otherwise,
      })}
    </form>
  );
}
