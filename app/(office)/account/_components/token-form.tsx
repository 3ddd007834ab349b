'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { Field } from '@/app/_components/ui/field';
import { SecretOnce } from '@/app/_components/ui/secret-once';
import { Select } from '@/app/_components/ui/select';
import { TextInput } from '@/app/_components/ui/text-input';
import { makeTokenAction } from '../actions';

const lives = [
  { value: '30', label: '30 days' },
  { value: '90', label: '90 days' },
  { value: '365', label: 'a year' },
  { value: 'never', label: 'no end, until revoked' },
];

export function TokenForm() {
  return (
    <ActionForm
      action={makeTokenAction}
      fields={['name', 'access', 'life']}
      label="Make an API token"
      resets
      className="grid gap-3"
    >
      {({ isPending, issue, typed, result }) => (
        <>
          <div className="grid items-start gap-3 sm:grid-cols-[1fr_10rem]">
            <Field label="What it is for" required error={issue('name')}>
              {(control) => (
                <TextInput
                  {...control}
                  name="name"
                  placeholder="dome computer"
                  defaultValue={typed('name')}
                />
              )}
            </Field>
            <Field label="Valid for" required error={issue('life')}>
              {(control) => (
                <Select {...control} name="life" choices={lives} defaultValue={typed('life', '90')} />
              )}
            </Field>
          </div>
          <fieldset className="flex flex-wrap gap-x-5 gap-y-1">
            <legend className="mb-0.5 text-small text-ink-2">It may</legend>
            <Checkbox radio name="access" value="read" defaultChecked label="read what you may see" />
            <Checkbox radio name="access" value="read-write" label="read and write what you may" />
          </fieldset>
          <div>
            <Button type="submit" busy={isPending} busyLabel="Making…">
              Make a token
            </Button>
          </div>
          {result?.ok ? (
            <SecretOnce secret={result.value.token}>
              The token, shown now and never again. Send it as “Authorization: Bearer …”.
            </SecretOnce>
          ) : null}
        </>
      )}
    </ActionForm>
  );
}
