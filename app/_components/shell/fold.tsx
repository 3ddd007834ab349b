'use client';

import { usePathname } from 'next/navigation';
import { useEffect, useRef, type ReactNode } from 'react';

interface FoldProps {
  readonly label: ReactNode;
  readonly children: ReactNode;
  readonly className?: string;
}

/** A menu under its name: opens without scripts; with them it also closes on Esc, on a click elsewhere and on arrival. */
export function Fold({ label, children, className = '' }: FoldProps) {
  const ref = useRef<HTMLDetailsElement>(null);
  const pathname = usePathname();
  useEffect(() => {
    if (ref.current !== null) ref.current.open = false;
  }, [pathname]);
  useEffect(() => {
    const close = (event: Event) => {
      const fold = ref.current;
      if (fold === null || !fold.open) return;
      if (event instanceof KeyboardEvent) {
        if (event.key !== 'Escape') return;
        if (fold.contains(document.activeElement)) fold.querySelector('summary')?.focus();
        fold.open = false;
      } else if (event.target instanceof Node && !fold.contains(event.target)) fold.open = false;
    };
    document.addEventListener('keydown', close);
    document.addEventListener('pointerdown', close);
    return () => {
      document.removeEventListener('keydown', close);
      document.removeEventListener('pointerdown', close);
    };
  }, []);
  return (
    <details ref={ref} className={`group relative ${className}`}>
      <summary className="flex min-h-6 cursor-pointer items-center gap-1.5 py-1 whitespace-nowrap text-ink-2 group-open:text-ink hover:text-ink">
        {label}
        <svg viewBox="0 0 10 6" aria-hidden="true" className="h-1.5 w-2.5 group-open:rotate-180">
          <path d="M1 1l4 4 4-4" fill="none" stroke="currentColor" strokeWidth="1.5" />
        </svg>
      </summary>
      {children}
    </details>
  );
}
