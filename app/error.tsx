'use client';

import { Button } from './_components/ui/button';
import { ErrorNotice } from './_components/ui/error-notice';

interface ErrorPageProps {
  readonly error: Error & { readonly digest?: string };
  readonly reset: () => void;
}

/** What a page shows when making it failed. The cause is in the log under the reference, not here. */
export default function ErrorPage({ error, reset }: ErrorPageProps) {
  return (
    <div className="max-w-prose py-10">
      <h1 className="sr-only">This page could not be made</h1>
      <ErrorNotice
        title="This page could not be made"
        fault={{
          detail:
            'Something went wrong on our side. Nothing that was logged or sent is lost. Try again; if it stays so, tell the observatory’s manager the reference.',
          reference: error.digest,
        }}
        action={<Button onClick={reset}>Try again</Button>}
      />
    </div>
  );
}
