import Link from 'next/link';
import type { Route } from 'next';
import type { ReactNode } from 'react';
import { buttonClass, KeyHint, type ButtonLook } from './button';

interface LinkButtonProps<T extends string> {
  readonly href: Route<T>;
  readonly look?: ButtonLook;
  readonly shortcut?: string;
  readonly className?: string;
  readonly children: ReactNode;
}

/** A link that looks like a button: it goes somewhere, it does nothing. */
export function LinkButton<T extends string>({
  href,
  look,
  shortcut,
  className,
  children,
}: LinkButtonProps<T>) {
  return (
    <Link href={href} aria-keyshortcuts={shortcut} className={buttonClass(look, className)}>
      {children}
      {shortcut === undefined ? null : <KeyHint>{shortcut}</KeyHint>}
    </Link>
  );
}
