import type { Metadata } from 'next';
import { Suspense } from 'react';
import { LogTab } from './_components/log-tab';

export const metadata: Metadata = { title: 'Night' };

/** The log of a night: its data are the layout's. */
export default function NightLogPage() {
  return (
    <Suspense>
      <LogTab />
    </Suspense>
  );
}
