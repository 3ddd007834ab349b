'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';
import { changeNameAction } from '../actions';

export function NameForm({ name }: { readonly name: string }) {
  return (
    <ActionForm action={changeNameAction} fields={['name']} label="Your name" className="grid gap-3">
      {({ isPending, issue, typed, result }) => (
        <>
          <Field label="Name, as others see it" required error={issue('name')}>
            {(control) => (
              <TextInput {...control} name="name" autoComplete="name" defaultValue={typed('name', name)} />
            )}
          </Field>
          <div className="flex flex-wrap items-center gap-3">
            <Button type="submit" busy={isPending} busyLabel="Saving…">
              Save the name
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
