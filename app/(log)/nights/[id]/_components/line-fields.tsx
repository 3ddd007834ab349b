import { useMemo, type FocusEvent } from 'react';
import { Combobox } from '@/app/_components/ui/combobox';
import { Field } from '@/app/_components/ui/field';
import { formatClock } from '@/app/_components/ui/format-time';
import { NumberInput } from '@/app/_components/ui/number-input';
import { TextInput } from '@/app/_components/ui/text-input';
import { frameTypes } from '@/lib/contracts/bands';
import { starKey } from '@/lib/contracts/star-name';
import type { FrameLine, LineFaults, LineField } from './frame-line';
import { useNight } from './night-provider';

const typeOptions = frameTypes.map((value) => ({ value }));
const holdsName = (option: string, typed: string) => starKey(option).includes(starKey(typed));

/** Names that complete, with whose or what they are. */
function useObjectOptions() {
  const { objects } = useNight();
  return useMemo(
    () => objects.map(({ name, programme }) => ({ value: name, note: programme ?? 'standard field' })),
    [objects],
  );
}

interface LineState {
  readonly line: FrameLine;
  readonly faults: LineFaults;
  /** Whether an empty start means now. */
  readonly isNow: boolean;
  readonly set: (field: LineField, value: string) => void;
}

/** The fields of the line in the order in which one types them. */
export function LineFields({ state, now }: { readonly state: LineState; readonly now: number }) {
  const { log } = useNight();
  const { line, faults, isNow, set } = state;
  const objects = useObjectOptions();
  const bandOptions = log.telescope.filters.map(({ band, name }) => ({ value: band, note: name }));
  const present = formatClock(Math.floor(now / 1000) * 1000);
  const text = (field: LineField) => ({
    name: field,
    value: line[field],
    onChange: (event: { readonly target: { readonly value: string } }) => set(field, event.target.value),
  });
  const combo = (field: LineField) => ({
    name: field,
    value: line[field],
    onChange: (value: string) => set(field, value),
  });
  /** A clock that runs on under the fingers could not be typed over. */
  const freeze = (event: FocusEvent<HTMLInputElement>) => {
    const field = event.target;
    // What it shows becomes what it says: the field itself does not change, so the selection stays under fast fingers.
    if (line.start === '' && isNow) set('start', field.value);
    field.select();
  };
  return (
    <>
      <Field label="Frame" required error={faults.number}>
        {(control) => <NumberInput {...control} {...text('number')} />}
      </Field>
      <Field label="Type" required error={faults.type}>
        {(control) => <Combobox control={control} {...combo('type')} options={typeOptions} />}
      </Field>
      <Field label="Object" error={faults.object} className="max-lg:col-span-2">
        {(control) => (
          <Combobox
            control={control}
            {...combo('object')}
            options={objects}
            fits={holdsName}
            holdsEnter
            autoFocus
          />
        )}
      </Field>
      <Field label="Band" error={faults.band}>
        {(control) => <Combobox control={control} {...combo('band')} options={bandOptions} />}
      </Field>
      <Field label="Start, UTC" required error={faults.start} className="max-lg:col-span-2">
        {(control) => (
          <TextInput
            {...control}
            {...text('start')}
            mono
            value={line.start === '' && isNow ? present : line.start}
            onFocus={freeze}
          />
        )}
      </Field>
      <Field label="Exposure, s" required error={faults.exposure}>
        {(control) => <NumberInput {...control} {...text('exposure')} />}
      </Field>
      <Field label="Comment" error={faults.comment} className="max-lg:col-span-3">
        {(control) => <TextInput {...control} {...text('comment')} placeholder="optional" maxLength={500} />}
      </Field>
    </>
  );
}
