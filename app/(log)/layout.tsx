import type { ReactNode } from 'react';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { LogQueueProvider } from './_components/queue/log-queue';

/** Nobody passes without sign-in; what a person may do here each page asks again. */
export default async function LogLayout({ children }: { readonly children: ReactNode }) {
  const { publicId, name } = await callerOrSignIn();
  return <LogQueueProvider person={{ id: publicId, name }}>{children}</LogQueueProvider>;
}
