import { Field } from '@/app/_components/ui/field';
import { TextInput } from '@/app/_components/ui/text-input';

interface ReasonFieldProps {
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly hint: string;
}

/** Why something is undone; kept in the audit trail. */
export function ReasonField({ value, onChange, hint }: ReasonFieldProps) {
  return (
    <Field label="Reason" hint={hint}>
      {(control) => (
        <TextInput
          {...control}
          value={value}
          onChange={(event) => onChange(event.target.value)}
          maxLength={500}
        />
      )}
    </Field>
  );
}
