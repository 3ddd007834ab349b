'use client';

import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';
import { defaultSettings } from '@/lib/contracts/settings';
import { createProgrammeAction } from '../actions';
import { ProgrammeFields } from './programme-fields';

export function CreateForm() {
  return (
    <ActionForm
      action={createProgrammeAction}
      fields={['code', 'title', 'summary', 'proprietaryMonths']}
      label="Add a programme"
      resets
      className="grid gap-3"
    >
      {(state) => (
        <>
          <Field label="Code" required error={state.issue('code')} hint="As awarded; it stays.">
            {(control) => (
              <TextInput
                {...control}
                mono
                name="code"
                placeholder="MH27A-01"
                maxLength={32}
                defaultValue={state.typed('code')}
              />
            )}
          </Field>
          <ProgrammeFields
            state={state}
            values={{ title: '', summary: '', proprietaryMonths: defaultSettings.proprietaryMonths }}
          />
          <div className="flex flex-wrap items-center gap-3">
            <Button type="submit" look="primary" busy={state.isPending} busyLabel="Adding…">
              Add
            </Button>
            <span role="status" className="text-small text-ink-2">
              {state.result?.ok ? `${state.result.value.programme} is added.` : ''}
            </span>
          </div>
        </>
      )}
    </ActionForm>
  );
}
