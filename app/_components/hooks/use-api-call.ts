'use client';

import { useState } from 'react';
import type { ApiResult, Refusal } from './call-api';

function notice(detail: string): Refusal {
  return { status: 0, detail, issues: [], reference: undefined };
}
const unreachable = notice(
  'The server cannot be reached just now. What you typed is still here; try again shortly.',
);
const signedOut = notice(
  'You are no longer signed in. Sign in again in another tab, then try again here: what you typed stays.',
);

/** A call that a person waits for: whether it runs, and why it was refused. Nothing typed is lost by either. */
export function useApiCall() {
  const [isBusy, setBusy] = useState(false);
  const [refusal, setRefusal] = useState<Refusal | null>(null);
  /** Does the call; gives its value, or null with the refusal set. */
  const run = async <T>(call: Promise<ApiResult<T>>): Promise<{ readonly value: T } | null> => {
    setBusy(true);
    setRefusal(null);
    const result = await call.finally(() => setBusy(false));
    if (result.ok) return { value: result.value };
    setRefusal(
      result.kind === 'refused' ? result.refusal : result.kind === 'signed-out' ? signedOut : unreachable,
    );
    return null;
  };
  /** Refuses without asking: what the page can tell by itself. */
  const refuse = (detail: string) => setRefusal(notice(detail));
  return { isBusy, refusal, run, refuse, clear: () => setRefusal(null) };
}
