'use client';

import { useEffect, useRef, useState } from 'react';
import { Button } from '@/app/_components/ui/button';

/** A command to paste, with a button that copies it. It scrolls sideways by itself, so that the page does not. */
export function CodeBlock({ label, code }: { readonly label: string; readonly code: string }) {
  const [said, setSaid] = useState('');
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  useEffect(() => () => clearTimeout(timer.current), []);
  const copy = async () => {
    // A browser without a clipboard, or a page that may not use it: the text can still be selected.
    const isCopied = await navigator.clipboard.writeText(code).then(
      () => true,
      () => false,
    );
    setSaid(isCopied ? 'Copied' : 'Select the text to copy it');
    clearTimeout(timer.current);
    timer.current = setTimeout(() => setSaid(''), 2500);
  };
  return (
    <div className="min-w-0 rounded-control border border-rule bg-sunk">
      <div className="flex items-center gap-2 border-b border-rule px-2.5 py-1">
        <span className="text-small text-ink-2">{label}</span>
        <span role="status" className="ml-auto text-small text-ink-2">
          {said}
        </span>
        <Button look="quiet" className="min-h-6 px-1.5 py-0 text-small" onClick={() => void copy()}>
          Copy
        </Button>
      </div>
      <pre
        role="region"
        tabIndex={0}
        aria-label={label}
        className="overflow-x-auto px-2.5 py-2 text-small focus-visible:-outline-offset-2"
      >
        <code>{code}</code>
      </pre>
    </div>
  );
}
