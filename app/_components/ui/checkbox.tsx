import type { ComponentProps, ReactNode } from 'react';
import { classNames } from './class-names';

interface CheckboxProps extends Omit<ComponentProps<'input'>, 'type'> {
  readonly label: ReactNode;
  readonly hint?: ReactNode;
  /** One of several that exclude each other. */
  readonly radio?: boolean;
}

/** A tick box, or a radio button, drawn by us: the native ones light all channels. */
export function Checkbox({ label, hint, radio = false, className, ...rest }: CheckboxProps) {
  return (
    <label className={classNames('flex min-h-6 items-start gap-2 text-body', className)}>
      <span className="relative mt-0.5 block size-4.5 shrink-0">
        <input
          {...rest}
          type={radio ? 'radio' : 'checkbox'}
          className={classNames(
            'peer absolute inset-0 size-4.5 border border-edge bg-sheet checked:border-accent checked:bg-accent disabled:border-dashed',
            radio ? 'rounded-full' : 'rounded-tag',
          )}
        />
        <svg
          viewBox="0 0 18 18"
          aria-hidden="true"
          className="pointer-events-none absolute inset-0 hidden size-4.5 text-accent-ink peer-checked:block"
        >
          {radio ? (
            <circle cx="9" cy="9" r="3.5" fill="currentColor" />
          ) : (
            <path d="M4.5 9.5l3 3 6-7" fill="none" stroke="currentColor" strokeWidth="2" />
          )}
        </svg>
      </span>
      <span>
        {label}
        {hint === undefined ? null : <span className="block text-small text-ink-2">{hint}</span>}
      </span>
    </label>
  );
}
