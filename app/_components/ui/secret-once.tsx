'use client';

import { useState } from 'react';
import { Button } from './button';
import { Finding } from './finding';

interface SecretOnceProps {
  /** What it is, and that it is shown now only. */
  readonly children: string;
  readonly secret: string;
}

/** A token or link right after it was made: shown once, to be copied. */
export function SecretOnce({ children, secret }: SecretOnceProps) {
  const [isCopied, setCopied] = useState(false);
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(secret);
      setCopied(true);
    } catch {
      // Some browsers refuse the clipboard; the text stands there to be copied by hand.
      setCopied(false);
    }
  };
  return (
    <Finding tone="good" word="Made">
      <p>{children}</p>
      <p className="mt-1 flex flex-wrap items-center gap-2">
        <code className="min-w-0 text-small wrap-anywhere select-all" data-secret>
          {secret}
        </code>
        <Button onClick={() => void copy()}>{isCopied ? 'Copied' : 'Copy'}</Button>
      </p>
    </Finding>
  );
}
