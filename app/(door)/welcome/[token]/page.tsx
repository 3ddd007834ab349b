import type { Metadata } from 'next';
import { LinkButton } from '@/app/_components/ui/link-button';
import { Panel } from '@/app/_components/ui/panel';
import { oneTimeLink, type OneTimeLink } from '@/lib/server/reads/one-time-link';
import { PasswordForm } from './_components/password-form';

// The address is the secret. The service's referrer policy keeps it from other sites; a stricter one would take the
// origin from the form that is sent without scripts.
export const metadata: Metadata = { title: 'Set a password', robots: 'noindex' };

const refusals: Readonly<Record<Exclude<OneTimeLink['state'], 'open'> | 'unknown', string>> = {
  used: 'It has been used. Sign in with the password that was set by it; if you did not set it, tell a manager of the observatory at once.',
  expired: 'It has expired. Ask a manager of the observatory for a new one.',
  disabled: 'The account is disabled. A manager of the observatory can enable it.',
  unknown: 'There is no such link. It may have been cut short when it was copied.',
};

export default async function WelcomePage({ params }: PageProps<'/welcome/[token]'>) {
  const { token } = await params;
  const link = await oneTimeLink(null, token);
  if (link?.state !== 'open') {
    return (
      <div className="mx-auto max-w-prose py-6 md:py-12">
        <h1 className="text-title font-medium">This link does not work</h1>
        <p className="mt-2 text-ink-2">{refusals[link?.state ?? 'unknown']}</p>
        <p className="mt-4">
          <LinkButton href="/sign-in">Sign in</LinkButton>
        </p>
      </div>
    );
  }
  return (
    <div className="mx-auto max-w-sm py-6 md:py-12">
      <h1 className="mb-3 text-title font-medium">
        {link.purpose === 'invitation' ? `Welcome, ${link.name}` : 'Set a new password'}
      </h1>
      <Panel title={link.email} note="This link works once">
        <PasswordForm token={token} email={link.email} />
      </Panel>
    </div>
  );
}
