'use client';

import { useEffect, useRef, type ReactNode } from 'react';

interface DisclosureProps {
  /** Its address on the page: a link to it opens it. */
  readonly id: string;
  readonly summary: ReactNode;
  readonly children: ReactNode;
}

/** A part that opens at a press, at a link to it, and in the browser's own search. Works before scripts have loaded. */
export function Disclosure({ id, summary, children }: DisclosureProps) {
  const details = useRef<HTMLDetailsElement>(null);
  useEffect(() => {
    const openIfAsked = () => {
      if (location.hash !== `#${id}` || !details.current) return;
      details.current.open = true;
      details.current.scrollIntoView();
    };
    openIfAsked();
    addEventListener('hashchange', openIfAsked);
    return () => removeEventListener('hashchange', openIfAsked);
  }, [id]);
  return (
    <details ref={details} id={id} className="group border-t border-rule first:border-t-0">
      <summary className="flex cursor-pointer gap-2.5 px-3.5 py-2 hover:bg-sunk focus-visible:-outline-offset-2">
        <span aria-hidden="true" className="w-3 shrink-0 text-ink-2">
          <span className="group-open:hidden">▸</span>
          <span className="hidden group-open:inline">▾</span>
        </span>
        {summary}
      </summary>
      <div className="px-3.5 pt-1 pb-4 md:pl-9">{children}</div>
    </details>
  );
}
