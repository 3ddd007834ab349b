'use client';

import Link from 'next/link';
import { useActionState } from 'react';
import { signOutAction } from '@/app/(door)/sign-out/actions';
import { Button } from '../ui/button';

/** What is the signed-in person's own: the account, and the way out. */
export function PersonMenu() {
  const [result, leave, isPending] = useActionState(signOutAction, null);
  return (
    <div className="grid gap-3">
      <Link href="/account">Your account</Link>
      <form action={leave}>
        <Button type="submit" busy={isPending} busyLabel="Signing out…">
          Sign out
        </Button>
        {result !== null && !result.ok ? (
          <p role="alert" className="mt-2 max-w-52 text-small font-medium text-bad">
            {result.fault.detail}
          </p>
        ) : null}
      </form>
    </div>
  );
}
