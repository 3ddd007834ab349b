import type { ComponentProps } from 'react';
import { classNames } from './class-names';
import { controlClass } from './control-class';

interface TextAreaProps extends ComponentProps<'textarea'> {
  readonly mono?: boolean;
}

export function TextArea({ mono = false, className, rows = 4, ...rest }: TextAreaProps) {
  return (
    <textarea
      {...rest}
      rows={rows}
      className={classNames(controlClass, 'field-sizing-content resize-none', mono && 'font-mono', className)}
    />
  );
}
