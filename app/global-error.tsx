'use client';

import { useSyncExternalStore } from 'react';
import { lightCookie, lightOf } from '@/lib/contracts/light';
import ErrorPage from './error';
import './globals.css';

const nothingToFollow = () => () => undefined;
const cookieLight = () => lightOf(new RegExp(`(?:^|; )${lightCookie}=([^;]+)`).exec(document.cookie)?.[1]);

interface GlobalErrorProps {
  readonly error: Error & { readonly digest?: string };
  readonly reset: () => void;
}

/** The frame itself failed. Dark site where the light is not known: the one screen that harms nobody. */
export default function GlobalError(props: GlobalErrorProps) {
  const light = useSyncExternalStore(nothingToFollow, cookieLight, () => 'dark-site' as const);
  return (
    <html lang="en-GB" data-light={light}>
      <body>
        <title>Evenfall</title>
        <main className="mx-auto max-w-page px-4 md:px-7">
          <ErrorPage {...props} />
        </main>
      </body>
    </html>
  );
}
