import type { Metadata } from 'next';
import Link from 'next/link';
import { ActButton } from '@/app/_components/ui/act-button';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { roleNames } from '@/lib/contracts/roles';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { readSessionCookie } from '@/lib/server/identity/session-cookie';
import { account } from '@/lib/server/reads/account';
import { NameForm } from './_components/name-form';
import { PasswordForm } from './_components/password-form';
import { SessionTable } from './_components/session-table';
import { TokenForm } from './_components/token-form';
import { TokenTable } from './_components/token-table';
import { endOtherSessionsAction } from './actions';

export const metadata: Metadata = { title: 'Your account' };

export default async function AccountPage() {
  const caller = await callerOrSignIn();
  const own = await account(caller, { cookie: await readSessionCookie() });
  return (
    <>
      <PageHead title="Your account">
        <span className="text-ink-2">{own.email}</span>
      </PageHead>
      <div className="grid items-start gap-4 lg:grid-cols-[minmax(0,26rem)_minmax(0,1fr)]">
        <div className="grid gap-4">
          <Panel title="Name">
            <NameForm name={own.name} />
          </Panel>
          <Panel title="Password">
            <PasswordForm email={own.email} />
          </Panel>
          <Panel title="Roles" note="Given by managers">
            <Roles roles={own.roles} programmes={own.programmes} />
          </Panel>
          <Panel title="Light">
            <p className="max-w-prose text-ink-2">
              The switch in the bar changes the light of this browser at once. Your last choice is remembered
              with the account and greets you in browsers where you have not chosen yet.
            </p>
          </Panel>
        </div>
        <div className="grid gap-4">
          <Panel
            title="API tokens"
            note="Keys for programs that act for you"
            flush
            actions={
              <Link href="/api-reference" className="text-small underline">
                HTTP interface
              </Link>
            }
          >
            {own.tokens.length === 0 ? (
              <p className="px-3.5 pt-3 text-ink-2">You have none.</p>
            ) : (
              <TokenTable
                tokens={own.tokens.map((token) => ({
                  ...token,
                  createdAt: token.createdAt.toISOString(),
                  lastUsedAt: token.lastUsedAt?.toISOString() ?? null,
                  expiresAt: token.expiresAt?.toISOString() ?? null,
                }))}
              />
            )}
            <div className="px-3.5 py-3">
              <TokenForm />
            </div>
          </Panel>
          <Panel
            title="Sessions"
            note="Browsers in which you are signed in"
            flush
            actions={
              own.sessions.length < 2 ? undefined : (
                <ActButton action={endOtherSessionsAction} values={{}} busyLabel="Signing out…">
                  Sign out all others
                </ActButton>
              )
            }
          >
            <SessionTable sessions={own.sessions} />
          </Panel>
        </div>
      </div>
    </>
  );
}

interface RolesProps {
  readonly roles: readonly (keyof typeof roleNames)[];
  readonly programmes: readonly {
    readonly code: string;
    readonly title: string;
    readonly role: keyof typeof roleNames;
  }[];
}

function Roles({ roles, programmes }: RolesProps) {
  if (roles.length === 0 && programmes.length === 0) {
    return <p className="text-ink-2">You have no role yet. A manager of the observatory gives roles.</p>;
  }
  return (
    <ul className="grid gap-1">
      {roles.map((role) => (
        <li key={role}>{roleNames[role]}</li>
      ))}
      {programmes.map(({ code, title, role }) => (
        <li key={code}>
          {roleNames[role]} of <span className="font-mono">{code}</span>{' '}
          <span className="text-ink-2">{title}</span>
        </li>
      ))}
    </ul>
  );
}
