import type { Metadata } from 'next';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { observatorySettings } from '@/lib/server/reads/settings';
import { SettingsForm } from './_components/settings-form';

export const metadata: Metadata = { title: 'Settings' };

export default async function SettingsPage() {
  const caller = await callerOrSignIn();
  const { name, settings } = await orNotFound(observatorySettings(caller));
  return (
    <>
      <PageHead title="Settings">
        <span className="text-ink-2">Rules of the observatory. Each change stands in the audit trail.</span>
      </PageHead>
      <div className="max-w-3xl">
        <Panel>
          <SettingsForm name={name} settings={settings} />
        </Panel>
      </div>
    </>
  );
}
