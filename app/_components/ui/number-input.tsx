import type { ComponentProps } from 'react';
import { classNames } from './class-names';
import { controlClass } from './control-class';

/**
 * A figure as text: the native number field drops what it cannot read without a word, changes under a scrolling wheel
 * and differs by locale. The rule that reads it says what is wrong instead.
 */
export function NumberInput({ className, ...rest }: Omit<ComponentProps<'input'>, 'type'>) {
  return (
    <input
      inputMode="decimal"
      autoComplete="off"
      spellCheck={false}
      {...rest}
      type="text"
      className={classNames(controlClass, 'text-right font-mono', className)}
    />
  );
}
