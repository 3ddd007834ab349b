'use client';

import { ActButton } from '@/app/_components/ui/act-button';
import { ActionForm } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { archiveProgrammeAction, changeProgrammeAction } from '../../actions';
import { ProgrammeFields } from '../../_components/programme-fields';

interface ProgrammeFormProps {
  readonly programme: string;
  readonly values: { readonly title: string; readonly summary: string; readonly proprietaryMonths: number };
  readonly isArchived: boolean;
}

export function ProgrammeForm({ programme, values, isArchived }: ProgrammeFormProps) {
  return (
    <>
      <ActionForm
        action={changeProgrammeAction}
        fields={['title', 'summary', 'proprietaryMonths']}
        label="Change the programme"
        className="grid gap-3"
      >
        {(state) => (
          <>
            <input type="hidden" name="programme" value={programme} />
            <ProgrammeFields state={state} values={values} />
            <div className="flex flex-wrap items-center gap-3">
              <Button type="submit" busy={state.isPending} busyLabel="Saving…">
                Save
              </Button>
              <span role="status" className="text-small text-ink-2">
                {state.result?.ok ? 'Saved.' : ''}
              </span>
            </div>
          </>
        )}
      </ActionForm>
      <div className="mt-4 border-t border-rule pt-3">
        <ActButton
          action={archiveProgrammeAction}
          values={{ programme, isArchived: isArchived ? 'no' : 'yes' }}
          {...(isArchived
            ? {}
            : {
                confirm: {
                  title: `Archive ${programme}?`,
                  text: 'It takes no new frames then. Everything stays readable, and it can be taken back.',
                  yes: 'Archive',
                },
              })}
        >
          {isArchived ? 'Take back from the archive' : 'Archive'}
        </ActButton>
      </div>
    </>
  );
}
