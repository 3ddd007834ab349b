import type { ReactNode } from 'react';

interface FoldOutProps {
  readonly label: string;
  readonly children: ReactNode;
}

/** What few look at, under its name. */
export function FoldOut({ label, children }: FoldOutProps) {
  return (
    <details className="group border-t border-rule">
      <summary className="flex min-h-6 cursor-pointer items-center gap-2 px-3.5 py-2 text-small text-ink-2 hover:text-ink focus-visible:-outline-offset-2">
        <svg viewBox="0 0 6 10" aria-hidden="true" className="h-2.5 w-1.5 shrink-0 group-open:rotate-90">
          <path d="M1 1l4 4-4 4" fill="none" stroke="currentColor" strokeWidth="1.5" />
        </svg>
        {label}
      </summary>
      <div className="pb-3">{children}</div>
    </details>
  );
}
