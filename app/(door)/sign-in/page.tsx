import type { Metadata, Route } from 'next';
import { redirect } from 'next/navigation';
import { Panel } from '@/app/_components/ui/panel';
import { currentCaller } from '@/lib/server/identity/current-caller';
import { localPath } from '@/lib/server/identity/local-path';
import { SignInForm } from './_components/sign-in-form';

export const metadata: Metadata = { title: 'Sign in' };

export default async function SignInPage({ searchParams }: PageProps<'/sign-in'>) {
  const { next } = await searchParams;
  const target = localPath(next);
  if (await currentCaller()) redirect(target as Route);
  return (
    <div className="mx-auto max-w-sm py-6 md:py-12">
      <h1 className="mb-3 text-title font-medium">Sign in</h1>
      <Panel>
        <SignInForm next={target} />
      </Panel>
      <p className="mt-3 text-small text-ink-2">
        Accounts are made by the observatory’s managers, who also help with a forgotten password: they send a
        link by which you set a new one.
      </p>
    </div>
  );
}
