'use client';

import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { Select } from '@/app/_components/ui/select';
import { TextInput } from '@/app/_components/ui/text-input';

interface StandardsFilterProps {
  readonly name: string;
  readonly telescopes: readonly { readonly code: string; readonly name: string }[];
  readonly telescope: string | undefined;
}

/** A plain form of an address: it works without scripts, and the answer can be kept as a bookmark. */
export function StandardsFilter({ name, telescopes, telescope }: StandardsFilterProps) {
  return (
    <form action="/standards" role="search" className="mb-4 flex flex-wrap items-end gap-3">
      <Field label="Star" hint="Part of its name, in any spelling" className="w-60">
        {(control) => (
          <TextInput {...control} name="name" defaultValue={name} placeholder="SA 95-112 or 95 112" />
        )}
      </Field>
      {telescopes.length < 2 ? null : (
        <Field label="Telescope" hint="For tonight’s airmass" className="w-60">
          {(control) => (
            <Select
              {...control}
              name="telescope"
              defaultValue={telescope}
              choices={telescopes.map((each) => ({ value: each.code, label: each.name }))}
            />
          )}
        </Field>
      )}
      <Button type="submit" className="mb-5">
        Find
      </Button>
    </form>
  );
}
