import type { ReactNode } from 'react';
import { TopBar, type TopBarProps } from './top-bar';

interface ShellProps extends TopBarProps {
  readonly children: ReactNode;
}

/** The frame around every page. */
export function Shell({ children, ...bar }: ShellProps) {
  return (
    <>
      <a
        href="#content"
        className="sr-only focus:not-sr-only focus:absolute focus:z-40 focus:m-2 focus:rounded-control focus:bg-accent focus:px-3 focus:py-2 focus:text-accent-ink"
      >
        Skip to content
      </a>
      <TopBar {...bar} />
      <main id="content" tabIndex={-1} className="mx-auto max-w-page px-4 pt-5 pb-10 outline-none md:px-7">
        {children}
      </main>
    </>
  );
}
