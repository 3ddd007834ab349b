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
    <label
      className={classNames('flex min-h-6 items-start gap-2 text-body has-disabled:text-ink-2', className)}
    >
      <span className="relative block size-6 shrink-0">
        <input
          {...rest}
          type={radio ? 'radio' : 'checkbox'}
          className={classNames(
            'peer absolute inset-0 size-6 bg-transparent',
            radio ? 'rounded-full' : 'rounded-tag',
          )}
        />
        <svg
          viewBox="0 0 24 24"
          aria-hidden="true"
          className="pointer-events-none absolute inset-0 size-6 fill-sheet stroke-edge peer-checked:fill-accent peer-checked:stroke-accent peer-disabled:stroke-rule [&>:last-child]:hidden peer-checked:[&>:last-child]:inline"
        >
          {radio ? (
            <circle cx="12" cy="12" r="8.5" />
          ) : (
            <rect x="3.5" y="3.5" width="17" height="17" rx="3" />
          )}
          {radio ? (
            <circle cx="12" cy="12" r="3.5" className="fill-accent-ink stroke-none" />
          ) : (
            <path d="M7.5 12.5l3 3 6-7" className="fill-none stroke-accent-ink" strokeWidth="2" />
          )}
        </svg>
      </span>
      <span className="pt-0.5">
        {label}
        {hint === undefined ? null : <span className="block text-small text-ink-2">{hint}</span>}
      </span>
    </label>
  );
}
