import type { Metadata } from 'next';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { people } from '@/lib/server/reads/people';
import { InviteForm } from './_components/invite-form';
import { PeopleTable } from './_components/people-table';

export const metadata: Metadata = { title: 'People' };

export default async function PeoplePage() {
  const caller = await callerOrSignIn();
  const listed = await orNotFound(people(caller));
  return (
    <>
      <PageHead title="People">
        <span className="text-ink-2">
          Roles hold for the whole observatory; investigators are named in their programmes.
        </span>
      </PageHead>
      <div
        className={
          listed.mayManage
            ? 'grid items-start gap-5 xl:grid-cols-[minmax(0,1fr)_minmax(320px,24%)]'
            : undefined
        }
      >
        <Panel title="Accounts" note={`${listed.people.length}`} flush>
          {listed.people.length === 0 ? (
            <EmptyState title="Nobody yet">Everybody who signs in has an account here.</EmptyState>
          ) : (
            <PeopleTable people={listed.people} mayManage={listed.mayManage} own={caller.publicId} />
          )}
        </Panel>
        {listed.mayManage ? (
          <Panel title="Invite somebody" note="by a one-time link">
            <InviteForm />
          </Panel>
        ) : null}
      </div>
    </>
  );
}
