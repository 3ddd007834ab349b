import type { ComponentProps } from 'react';
import { classNames } from './class-names';
import { controlClass } from './control-class';

interface Choice {
  readonly value: string;
  readonly label: string;
  readonly disabled?: boolean;
}

interface SelectProps extends ComponentProps<'select'> {
  readonly choices?: readonly Choice[];
}

export function Select({ choices, className, children, ...rest }: SelectProps) {
  return (
    <span className={classNames('relative block min-w-0', className)}>
      <select {...rest} className={classNames(controlClass, 'pr-7')}>
        {choices?.map(({ value, label, disabled }) => (
          <option key={value} value={value} disabled={disabled}>
            {label}
          </option>
        ))}
        {children}
      </select>
      <svg
        viewBox="0 0 10 6"
        aria-hidden="true"
        className="pointer-events-none absolute top-1/2 right-2 h-1.5 w-2.5 -translate-y-1/2"
      >
        <path d="M1 1l4 4 4-4" fill="none" stroke="currentColor" strokeWidth="1.5" />
      </svg>
    </span>
  );
}
