import { Button } from '@/app/_components/ui/button';
import { Field } from '@/app/_components/ui/field';
import { Select } from '@/app/_components/ui/select';
import { jobKindNames, jobTitles } from '@/lib/contracts/job-kinds';
import type { JobsQuery } from './jobs-query';

/** Narrows the list to one kind; an ordinary form of the address, so that it works without scripts. */
export function JobsFilter({ query }: { readonly query: JobsQuery }) {
  return (
    <form
      action="/jobs"
      role="search"
      aria-label="Narrow the list of jobs"
      className="flex flex-wrap items-end gap-3 border-b border-rule bg-sunk px-3.5 py-2.5"
    >
      {query.state === undefined ? null : <input type="hidden" name="state" value={query.state} />}
      <Field label="Kind" className="w-56">
        {(control) => (
          <Select
            {...control}
            name="kind"
            defaultValue={query.kind ?? ''}
            choices={[
              { value: '', label: 'all' },
              ...jobKindNames.map((kind) => ({ value: kind, label: jobTitles[kind] })),
            ]}
          />
        )}
      </Field>
      <Button type="submit">Show</Button>
    </form>
  );
}
