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
      // Where the field grows with its content, its rows are not looked at.
      style={{ minHeight: `calc(${rows} * 1lh + 0.75rem)` }}
      className={classNames(controlClass, 'field-sizing-content resize-none', mono && 'font-mono', className)}
    />
  );
}
