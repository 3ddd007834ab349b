'use client';

import type { ReactNode } from 'react';
import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { Field } from '@/app/_components/ui/field';
import { NumberInput } from '@/app/_components/ui/number-input';
import { TextInput } from '@/app/_components/ui/text-input';
import { defaultSettings, settingSources, type Settings } from '@/lib/contracts/settings';
import { changeSettingsAction } from '../actions';

interface SettingsFormProps {
  readonly name: string;
  readonly settings: Settings;
}

type LimitName = keyof Settings['verdict'];
const limits: readonly { readonly name: LimitName; readonly label: string; readonly unit: string }[] = [
  { name: 'scatterV', label: 'Photometric in V up to', unit: 'mag' },
  { name: 'scatterB', label: 'Photometric in B up to', unit: 'mag' },
  { name: 'notPhotometric', label: 'Not photometric above', unit: 'mag' },
  { name: 'driftSigma', label: 'Drift is significant from', unit: 'of its errors' },
];

export function SettingsForm({ name, settings }: SettingsFormProps) {
  return (
    <ActionForm
      action={changeSettingsAction}
      fields={['name', 'proprietaryMonths', ...limits.map((limit) => limit.name)]}
      label="Settings"
      className="grid gap-5"
    >
      {({ isPending, issue, typed, result }) => (
        <>
          <Field label="Name of the observatory" required error={issue('name')}>
            {(control) => <TextInput {...control} name="name" defaultValue={typed('name', name)} />}
          </Field>
          <Group title="Releases and approval">
            <Checkbox
              name="secondApprover"
              defaultChecked={settings.secondApprover}
              label="A second person approves"
              hint={`Default: ${settingSources.secondApprover}. Without it the audit trail says so at each approval.`}
            />
            <Checkbox
              name="publicReleases"
              defaultChecked={settings.publicReleases}
              label="Public releases need no sign-in"
              hint={`Default: ${settingSources.publicReleases}.`}
            />
            <Field
              label="Proprietary period of new programmes, months"
              required
              error={issue('proprietaryMonths')}
              hint={`Default ${defaultSettings.proprietaryMonths}: ${settingSources.proprietaryMonths}.`}
              className="max-w-72"
            >
              {(control) => (
                <NumberInput
                  {...control}
                  name="proprietaryMonths"
                  defaultValue={typed('proprietaryMonths', String(settings.proprietaryMonths))}
                />
              )}
            </Field>
          </Group>
          <Group title="Limits that a verdict on a night is suggested by">
            <div className="grid gap-3 sm:grid-cols-2">
              {limits.map((limit) => (
                <Field
                  key={limit.name}
                  label={`${limit.label}, ${limit.unit}`}
                  required
                  error={issue(limit.name)}
                  hint={`Default ${defaultSettings.verdict[limit.name]}: ${settingSources[limit.name]}.`}
                >
                  {(control) => (
                    <NumberInput
                      {...control}
                      name={limit.name}
                      defaultValue={typed(limit.name, String(settings.verdict[limit.name]))}
                    />
                  )}
                </Field>
              ))}
            </div>
            <p className="text-small text-ink-2">
              A suggestion supports a person’s decision and never replaces it: approval is always a named
              person’s act.
            </p>
          </Group>
          <div className="flex flex-wrap items-center gap-3">
            <Button type="submit" look="primary" busy={isPending} busyLabel="Saving…">
              Save the settings
            </Button>
            <span role="status" className="text-small text-ink-2">
              {result?.ok ? 'Saved.' : ''}
            </span>
          </div>
        </>
      )}
    </ActionForm>
  );
}

function Group({ title, children }: { readonly title: string; readonly children: ReactNode }) {
  return (
    <fieldset className="grid gap-3 border-t border-rule pt-3">
      <legend className="pr-3 text-table font-semibold">{title}</legend>
      {children}
    </fieldset>
  );
}
