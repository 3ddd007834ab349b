import type { ComponentProps, ReactNode } from 'react';
import { classNames } from './class-names';

export type ButtonLook = 'plain' | 'primary' | 'bad' | 'quiet';

/** What cannot be pressed has no fill, a hairline where the others have an outline, and words in the second ink. */
const looks: Readonly<Record<ButtonLook, string>> = {
  plain: 'border-edge bg-sheet text-ink hover:bg-sunk disabled:border-rule',
  primary: 'border-accent bg-accent text-accent-ink hover:underline disabled:border-rule',
  bad: 'border-bad bg-sheet text-bad hover:bg-bad-wash disabled:border-rule',
  quiet: 'border-transparent bg-transparent text-ink underline hover:bg-sunk',
};

/** Classes of anything that looks like a button; links use them too. */
export function buttonClass(look: ButtonLook = 'plain', extra?: string): string {
  return classNames(
    'inline-flex min-h-8 items-center justify-center gap-1.5 rounded-control border px-3 py-1 text-body font-medium',
    'no-underline underline-offset-2 select-none disabled:bg-transparent disabled:text-ink-2 disabled:no-underline',
    looks[look],
    extra,
  );
}

export function KeyHint({ children }: { readonly children: ReactNode }) {
  return (
    <kbd aria-hidden="true" className="hidden font-sans text-fine font-normal md:inline">
      {children}
    </kbd>
  );
}

interface ButtonProps extends ComponentProps<'button'> {
  readonly look?: ButtonLook;
  /** The key that does the same, shown beside the label and told to assistive technology. */
  readonly shortcut?: string;
  /** Work is under way: the button keeps its place and says so. */
  readonly busy?: boolean;
  readonly busyLabel?: string;
}

export function Button({
  look = 'plain',
  shortcut,
  busy = false,
  busyLabel,
  type = 'button',
  className,
  children,
  disabled,
  ...rest
}: ButtonProps) {
  return (
    <button
      {...rest}
      type={type}
      disabled={disabled === true || busy}
      aria-busy={busy || undefined}
      aria-keyshortcuts={shortcut}
      className={buttonClass(look, className)}
    >
      {busy ? (busyLabel ?? children) : children}
      {shortcut !== undefined && !busy ? <KeyHint>{shortcut}</KeyHint> : null}
    </button>
  );
}
