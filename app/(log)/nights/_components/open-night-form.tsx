'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { DateInput } from '@/app/_components/ui/date-input';
import { Field } from '@/app/_components/ui/field';
import { Select } from '@/app/_components/ui/select';
import { openNightAction } from '../actions';

interface OpenNightFormProps {
  readonly telescopes: readonly { readonly code: string; readonly name: string }[];
  /** The evening date that is now. */
  readonly date: string;
}

export function OpenNightForm({ telescopes, date }: OpenNightFormProps) {
  return (
    <ActionForm
      action={openNightAction}
      fields={['telescope', 'date']}
      label="Open a night"
      className="grid gap-3"
    >
      {({ isPending, issue, typed }) => (
        <>
          <Field label="Telescope" required error={issue('telescope')}>
            {(control) => (
              <Select
                {...control}
                name="telescope"
                defaultValue={typed('telescope', telescopes[0]?.code)}
                choices={telescopes.map(({ code, name }) => ({ value: code, label: name }))}
              />
            )}
          </Field>
          <Field
            label="Evening date"
            hint="A night is named by the evening it begins on, and runs from noon to noon."
            required
            error={issue('date')}
          >
            {(control) => <DateInput {...control} name="date" defaultValue={typed('date', date)} />}
          </Field>
          <div>
            <Button type="submit" look="primary" busy={isPending} busyLabel="Opening…">
              Open the night
            </Button>
          </div>
        </>
      )}
    </ActionForm>
  );
}
