import type { ComponentProps } from 'react';
import { classNames } from './class-names';
import { controlClass } from './control-class';

interface TextInputProps extends ComponentProps<'input'> {
  /** Identifiers and times are set in Mono. */
  readonly mono?: boolean;
}

export function TextInput({ mono = false, className, type = 'text', ...rest }: TextInputProps) {
  return (
    <input
      autoComplete="off"
      spellCheck={false}
      {...rest}
      type={type}
      className={classNames(controlClass, mono && 'font-mono', className)}
    />
  );
}
