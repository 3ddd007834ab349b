import type { ReactNode } from 'react';
import { Field } from '@/app/_components/ui/field';
import { NumberInput } from '@/app/_components/ui/number-input';
import { TextInput } from '@/app/_components/ui/text-input';
import type { ConditionFaults, ConditionField, ConditionLine } from './condition-line';

interface ConditionFieldsProps {
  readonly line: ConditionLine;
  readonly faults: ConditionFaults;
  readonly set: (field: ConditionField, value: string) => void;
}

interface Asked {
  readonly field: ConditionField;
  readonly label: string;
  readonly hint?: ReactNode;
  readonly isText?: boolean;
}

const asked: readonly Asked[] = [
  { field: 'utc', label: 'Time, UTC', isText: true },
  { field: 'cloud', label: 'Cloud, eighths', hint: '0 clear, 8 overcast' },
  { field: 'seeing', label: 'Seeing, arcsec' },
  { field: 'humidity', label: 'Humidity, %' },
  { field: 'wind', label: 'Wind, m/s' },
  { field: 'wind_direction', label: 'Wind from', hint: 'NW, or degrees', isText: true },
  { field: 'temperature', label: 'Temperature, °C' },
  { field: 'sky_brightness', label: 'Sky, mag/arcsec²' },
];

export function ConditionFields({ line, faults, set }: ConditionFieldsProps) {
  const bound = (field: ConditionField) => ({
    name: field,
    value: line[field],
    onChange: (event: { readonly target: { readonly value: string } }) => set(field, event.target.value),
  });
  return (
    <div className="grid grid-cols-2 items-start gap-3 sm:grid-cols-4">
      {asked.map(({ field, label, hint, isText = false }) => (
        <Field key={field} label={label} hint={hint} required={field === 'utc'} error={faults[field]}>
          {(control) =>
            isText ? (
              <TextInput {...control} {...bound(field)} mono />
            ) : (
              <NumberInput {...control} {...bound(field)} data-first={field === 'cloud' || undefined} />
            )
          }
        </Field>
      ))}
      <Field label="Comment" error={faults.comment} className="col-span-full">
        {(control) => <TextInput {...control} {...bound('comment')} placeholder="optional" maxLength={500} />}
      </Field>
    </div>
  );
}
