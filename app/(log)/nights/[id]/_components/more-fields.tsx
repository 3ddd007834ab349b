import { Field } from '@/app/_components/ui/field';
import { NumberInput } from '@/app/_components/ui/number-input';
import { TextInput } from '@/app/_components/ui/text-input';
import type { FrameLine, LineFaults, LineField } from './frame-line';

interface MoreFieldsProps {
  readonly state: {
    readonly line: FrameLine;
    readonly faults: LineFaults;
    readonly set: (field: LineField, value: string) => void;
  };
}

const fields = [
  { field: 'file', label: 'File', hint: undefined, isFigure: false },
  { field: 'programme', label: 'Programme', hint: 'code; by the object if empty', isFigure: false },
  { field: 'ra', label: 'Right ascension', hint: 'J2000; by the object if empty', isFigure: false },
  { field: 'dec', label: 'Declination', hint: 'J2000', isFigure: false },
  { field: 'fwhm', label: 'FWHM, arcsec', hint: undefined, isFigure: true },
  { field: 'sky', label: 'Sky, mag/arcsec²', hint: undefined, isFigure: true },
] as const;

/** What a frame can say besides: where it is kept, where it looked, how good it is. */
export function MoreFields({ state: { line, faults, set } }: MoreFieldsProps) {
  return (
    <div className="col-span-full grid grid-cols-2 gap-2 md:grid-cols-3 lg:grid-cols-6">
      {fields.map(({ field, label, hint, isFigure }) => (
        <Field key={field} label={label} hint={hint} error={faults[field]}>
          {(control) => {
            const bound = {
              ...control,
              name: field,
              value: line[field],
              onChange: (event: { readonly target: { readonly value: string } }) =>
                set(field, event.target.value),
            };
            return isFigure ? <NumberInput {...bound} /> : <TextInput {...bound} mono />;
          }}
        </Field>
      ))}
    </div>
  );
}
