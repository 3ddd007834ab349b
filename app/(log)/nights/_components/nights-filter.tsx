import type { Route } from 'next';
import { Button } from '@/app/_components/ui/button';
import { DateInput } from '@/app/_components/ui/date-input';
import { Field } from '@/app/_components/ui/field';
import { LinkButton } from '@/app/_components/ui/link-button';
import { Select } from '@/app/_components/ui/select';
import { nightStates } from '@/lib/contracts/api/night';
import type { NightsQuery } from './nights-query';

interface NightsFilterProps {
  readonly query: NightsQuery;
  readonly telescopes: readonly { readonly code: string; readonly name: string }[];
}

/** Narrows the list; an ordinary form of the address, so that it works without scripts and can be linked to. */
export function NightsFilter({ query, telescopes }: NightsFilterProps) {
  return (
    <form
      action="/nights"
      noValidate
      role="search"
      aria-label="Narrow the list of nights"
      className="flex flex-wrap items-end gap-3 border-b border-rule bg-sunk px-3.5 py-2.5"
    >
      {query.month === undefined ? null : <input type="hidden" name="month" value={query.month} />}
      <Field label="Telescope" className="w-44">
        {(control) => (
          <Select
            {...control}
            name="telescope"
            defaultValue={query.telescope ?? ''}
            choices={[
              { value: '', label: 'all' },
              ...telescopes.map(({ code, name }) => ({ value: code, label: name })),
            ]}
          />
        )}
      </Field>
      <Field label="State" className="w-32">
        {(control) => (
          <Select
            {...control}
            name="state"
            defaultValue={query.state ?? ''}
            choices={[{ value: '', label: 'all' }, ...nightStates.map((value) => ({ value, label: value }))]}
          />
        )}
      </Field>
      <Field label="From" className="w-32">
        {(control) => <DateInput {...control} name="from" defaultValue={query.from} />}
      </Field>
      <Field label="To" className="w-32">
        {(control) => <DateInput {...control} name="to" defaultValue={query.to} />}
      </Field>
      <Button type="submit">Show</Button>
      <LinkButton href={'/nights' as Route} look="quiet">
        All nights
      </LinkButton>
    </form>
  );
}
