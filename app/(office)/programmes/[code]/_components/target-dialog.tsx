'use client';

import { ActionForm, type FormState } from '@/app/_components/ui/action-form';
import { Button } from '@/app/_components/ui/button';
import { Dialog } from '@/app/_components/ui/dialog';
import { Field } from '@/app/_components/ui/field';
import { Select } from '@/app/_components/ui/select';
import { TextInput } from '@/app/_components/ui/text-input';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { targetKinds, type TargetKind } from '@/lib/contracts/api/programme';
import { saveTargetAction } from '../../actions';

export interface TargetValues {
  readonly name: string;
  readonly kind: TargetKind;
  /** deg J2000; null for a new target */
  readonly ra: number | null;
  readonly dec: number | null;
  readonly note: string;
}

interface TargetDialogProps {
  readonly programme: string;
  readonly target: TargetValues;
  readonly onClose: () => void;
}

export function TargetDialog({ programme, target, onClose }: TargetDialogProps) {
  const isNew = target.name === '';
  return (
    <Dialog open onClose={onClose} title={isNew ? 'Add a target' : target.name}>
      <ActionForm
        action={saveTargetAction}
        fields={['name', 'kind', 'ra', 'dec', 'note']}
        label={isNew ? 'Add a target' : `Change ${target.name}`}
        onDone={onClose}
        className="grid gap-3"
      >
        {({ isPending, issue, typed }) => (
          <>
            <input type="hidden" name="programme" value={programme} />
            <input type="hidden" name="target" value={target.name} />
            <Field label="Name, as observers log it" required error={issue('name')}>
              {(control) => (
                <TextInput
                  {...control}
                  name="name"
                  maxLength={80}
                  defaultValue={typed('name', target.name)}
                />
              )}
            </Field>
            <Field label="Kind" required error={issue('kind')}>
              {(control) => (
                <Select
                  {...control}
                  name="kind"
                  defaultValue={typed('kind', target.kind)}
                  choices={targetKinds.map((kind) => ({ value: kind, label: kind }))}
                />
              )}
            </Field>
            <PlaceFields state={{ issue, typed }} target={target} />
            <Field label="Note" error={issue('note')}>
              {(control) => (
                <TextInput
                  {...control}
                  name="note"
                  maxLength={500}
                  defaultValue={typed('note', target.note)}
                />
              )}
            </Field>
            <div>
              <Button type="submit" look="primary" busy={isPending} busyLabel="Saving…">
                Save
              </Button>
            </div>
          </>
        )}
      </ActionForm>
    </Dialog>
  );
}

/** Digits that bring back what was stored: 0.1 milliseconds of time, a milliarcsecond. */
const raDecimals = 4;
const decDecimals = 3;

interface PlaceFieldsProps {
  readonly state: Pick<FormState<unknown>, 'issue' | 'typed'>;
  readonly target: TargetValues;
}

function PlaceFields({ state: { issue, typed }, target: { ra, dec } }: PlaceFieldsProps) {
  return (
    <>
      <Field
        label="Right ascension, J2000"
        required
        error={issue('ra')}
        hint="Hours as 07:52:14.3, or degrees as 118.0596"
      >
        {(control) => (
          <TextInput
            {...control}
            mono
            name="ra"
            defaultValue={typed('ra', ra === null ? '' : formatRightAscension(ra, raDecimals))}
          />
        )}
      </Field>
      <Field label="Declination, J2000" required error={issue('dec')} hint="Degrees as +22:00:19 or +22.0053">
        {(control) => (
          <TextInput
            {...control}
            mono
            name="dec"
            defaultValue={typed('dec', dec === null ? '' : formatDeclination(dec, decDecimals))}
          />
        )}
      </Field>
    </>
  );
}
