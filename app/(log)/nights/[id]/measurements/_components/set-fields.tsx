'use client';

import { Field } from '@/app/_components/ui/field';
import { NumberInput } from '@/app/_components/ui/number-input';
import { Select } from '@/app/_components/ui/select';
import { TextInput } from '@/app/_components/ui/text-input';
import { measurementKinds, type MeasurementKind } from '@/lib/contracts/measurement-kinds';

export interface SetValues {
  readonly kind: MeasurementKind;
  readonly name: string;
  /** As typed. [arcsec] */
  readonly tolerance: string;
}

interface SetFieldsProps {
  readonly values: SetValues;
  readonly disabled: boolean;
  readonly toleranceError: string | null;
  readonly onValues: (values: SetValues) => void;
}

const kinds: Readonly<Record<MeasurementKind, string>> = {
  standard: 'standards',
  target: 'targets',
  mixed: 'standards and targets',
};

/** What the set is: its kind, its name, and how near a star must lie to a standard. */
export function SetFields({ values, disabled, toleranceError, onValues }: SetFieldsProps) {
  const isMatched = values.kind !== 'target';
  return (
    <div className="grid gap-3 sm:grid-cols-2">
      <Field
        label="Its rows are"
        required
        hint={
          isMatched
            ? 'Stars are looked for among the standards.'
            : 'No star is looked for among the standards.'
        }
      >
        {(control) => (
          <Select
            {...control}
            disabled={disabled}
            value={values.kind}
            choices={measurementKinds.map((kind) => ({ value: kind, label: kinds[kind] }))}
            onChange={(event) => {
              const kind = measurementKinds.find((one) => one === event.target.value);
              if (kind) onValues({ ...values, kind });
            }}
          />
        )}
      </Field>
      <Field
        label="Tolerance, arcsec"
        required
        hint="For matching by position, where a star has no known name."
        error={toleranceError}
      >
        {(control) => (
          <NumberInput
            {...control}
            disabled={disabled}
            value={values.tolerance}
            onChange={(event) => onValues({ ...values, tolerance: event.target.value })}
          />
        )}
      </Field>
      <Field label="Name" hint="The file’s name, if you give none." className="sm:col-span-2">
        {(control) => (
          <TextInput
            {...control}
            disabled={disabled}
            maxLength={120}
            value={values.name}
            onChange={(event) => onValues({ ...values, name: event.target.value })}
          />
        )}
      </Field>
    </div>
  );
}
