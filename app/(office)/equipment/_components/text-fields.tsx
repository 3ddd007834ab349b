import type { FormState } from '@/app/_components/ui/action-form';
import { Field } from '@/app/_components/ui/field';
import { NumberInput } from '@/app/_components/ui/number-input';
import { TextInput } from '@/app/_components/ui/text-input';

export interface TextFieldSpec {
  readonly name: string;
  readonly label: string;
  readonly value: string | number | null;
  readonly hint?: string;
  readonly optional?: boolean;
}

interface TextFieldsProps {
  readonly state: Pick<FormState<unknown>, 'issue' | 'typed'>;
  readonly fields: readonly TextFieldSpec[];
}

/** Plain fields of a form, in the order given; figures are set to the right. */
export function TextFields({ state: { issue, typed }, fields }: TextFieldsProps) {
  return fields.map(({ name, label, value, hint, optional = false }) => {
    const Input = typeof value === 'number' ? NumberInput : TextInput;
    return (
      <Field key={name} label={label} required={!optional} error={issue(name)} hint={hint}>
        {(control) => (
          <Input {...control} name={name} defaultValue={typed(name, value === null ? '' : String(value))} />
        )}
      </Field>
    );
  });
}
