import type { FormState } from '@/app/_components/ui/action-form';
import { Field } from '@/app/_components/ui/field';
import { NumberInput } from '@/app/_components/ui/number-input';
import { TextArea } from '@/app/_components/ui/text-area';
import { TextInput } from '@/app/_components/ui/text-input';

interface ProgrammeFieldsProps {
  readonly state: Pick<FormState<unknown>, 'issue' | 'typed'>;
  readonly values: { readonly title: string; readonly summary: string; readonly proprietaryMonths: number };
}

/** Title, summary and proprietary period: what a new programme and a changed one have in common. */
export function ProgrammeFields({ state: { issue, typed }, values }: ProgrammeFieldsProps) {
  return (
    <>
      <Field label="Title" required error={issue('title')}>
        {(control) => <TextInput {...control} name="title" defaultValue={typed('title', values.title)} />}
      </Field>
      <Field label="Summary" error={issue('summary')}>
        {(control) => (
          <TextArea {...control} name="summary" rows={4} defaultValue={typed('summary', values.summary)} />
        )}
      </Field>
      <Field
        label="Proprietary period, months after the night"
        required
        error={issue('proprietaryMonths')}
        className="max-w-72"
      >
        {(control) => (
          <NumberInput
            {...control}
            name="proprietaryMonths"
            defaultValue={typed('proprietaryMonths', String(values.proprietaryMonths))}
          />
        )}
      </Field>
    </>
  );
}
