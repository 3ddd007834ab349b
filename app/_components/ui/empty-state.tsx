import type { ReactNode } from 'react';

interface EmptyStateProps {
  /** What is not here: “No nights yet”. */
  readonly title: string;
  /** What belongs here, and how it comes. */
  readonly children: ReactNode;
  /** The one action that fills the place. */
  readonly action?: ReactNode;
}

export function EmptyState({ title, children, action }: EmptyStateProps) {
  return (
    <div className="px-5 py-8">
      <p className="font-medium">{title}</p>
      <div className="mt-1 max-w-prose text-ink-2">{children}</div>
      {action === undefined ? null : <div className="mt-4">{action}</div>}
    </div>
  );
}
