import Link from 'next/link';
import type { Route } from 'next';

export interface Tab {
  readonly href: Route;
  readonly label: string;
  /** How much is behind it: `46`, `3 sets`. */
  readonly count?: string;
  readonly isCurrent: boolean;
}

/** Parts of one thing as links: each has its own address. */
export function Tabs({ label, tabs }: { readonly label: string; readonly tabs: readonly Tab[] }) {
  return (
    <nav aria-label={label} className="mb-4 overflow-x-auto border-b border-rule">
      <ul className="flex gap-5.5">
        {tabs.map((tab) => (
          <li key={tab.href}>
            <Link
              href={tab.href}
              aria-current={tab.isCurrent ? 'page' : undefined}
              className="block border-b-2 border-transparent py-2 whitespace-nowrap text-ink-2 no-underline hover:text-ink focus-visible:-outline-offset-2 aria-[current]:border-accent aria-[current]:font-medium aria-[current]:text-ink"
            >
              {tab.label}
              {tab.count === undefined ? null : (
                <small className="ml-1 text-small font-normal text-ink-2">{tab.count}</small>
              )}
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  );
}
