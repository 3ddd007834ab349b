import { useId, type ReactNode } from 'react';
import { classNames } from './class-names';

/** What a control takes over from its field. */
export interface FieldControl {
  readonly id: string;
  readonly 'aria-describedby'?: string;
  readonly 'aria-invalid'?: true;
  readonly 'aria-required'?: true;
}

interface FieldProps {
  readonly label: ReactNode;
  /** Unit, or what to type; shown before anything is wrong. */
  readonly hint?: ReactNode;
  readonly error?: string | null | undefined;
  readonly required?: boolean;
  /** The label stays for assistive technology only. */
  readonly hideLabel?: boolean;
  readonly className?: string;
  readonly children: (control: FieldControl) => ReactNode;
}

/**
 * Label, control, hint and error as one. The browser's own message bubbles are white, so nothing is marked `required`
 * natively: forms are `noValidate` and say what is wrong themselves.
 */
export function Field({
  label,
  hint,
  error,
  required = false,
  hideLabel = false,
  className,
  children,
}: FieldProps) {
  const id = useId();
  const hintId = `${id}-hint`;
  const errorId = `${id}-error`;
  const hasHint = hint !== undefined && hint !== null;
  const hasError = error !== undefined && error !== null && error !== '';
  const describedBy = [hasError ? errorId : '', hasHint ? hintId : ''].filter(Boolean).join(' ');
  return (
    <div className={classNames('min-w-0', className)}>
      <label
        htmlFor={id}
        className={classNames('mb-0.5 block text-small text-ink-2', hideLabel && 'sr-only')}
      >
        {label}
        {required ? null : <span className="sr-only"> (optional)</span>}
      </label>
      {children({
        id,
        ...(describedBy === '' ? {} : { 'aria-describedby': describedBy }),
        ...(hasError ? { 'aria-invalid': true as const } : {}),
        ...(required ? { 'aria-required': true as const } : {}),
      })}
      {hasError ? (
        <p id={errorId} className="mt-1 text-small font-medium text-bad">
          <span aria-hidden="true">✕ </span>
          {error}
        </p>
      ) : null}
      {hasHint ? (
        <p id={hintId} className="mt-1 text-small text-ink-2">
          {hint}
        </p>
      ) : null}
    </div>
  );
}
