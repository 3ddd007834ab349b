import type { ReactNode } from 'react';

interface PageHeadProps {
  readonly title: ReactNode;
  /** Beside the title: place, state, one line of what matters. */
  readonly children?: ReactNode;
  readonly actions?: ReactNode;
}

export function PageHead({ title, children, actions }: PageHeadProps) {
  return (
    <div className="mb-3 flex flex-wrap items-baseline gap-x-4 gap-y-2">
      <h1 className="text-title font-medium tracking-[-.005em]">{title}</h1>
      {children}
      {actions === undefined ? null : (
        <div className="ml-auto flex flex-wrap items-center gap-2">{actions}</div>
      )}
    </div>
  );
}
