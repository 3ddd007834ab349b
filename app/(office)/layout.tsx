import type { ReactNode } from 'react';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';

/** Nobody passes without sign-in; what a person may do here each page asks again. */
export default async function OfficeLayout({ children }: { readonly children: ReactNode }) {
  await callerOrSignIn();
  return children;
}
