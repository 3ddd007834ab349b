import type { Route } from 'next';
import { Button } from '@/app/_components/ui/button';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { Field } from '@/app/_components/ui/field';
import { formatPlain } from '@/lib/contracts/format-figure';
import { LinkButton } from '@/app/_components/ui/link-button';
import { NumberInput } from '@/app/_components/ui/number-input';
import { Select } from '@/app/_components/ui/select';
import { TextInput } from '@/app/_components/ui/text-input';
import type { CalibratedPage, CalibratedPageQuery } from '@/lib/contracts/calibrated-page';
import { resultsAddress } from './results-address';

interface ResultsFilterProps {
  readonly page: CalibratedPage;
  readonly query: CalibratedPageQuery;
}

const limits = [
  { name: 'v_from', label: 'V from' },
  { name: 'v_to', label: 'V to' },
  { name: 'bv_from', label: 'B−V from' },
  { name: 'bv_to', label: 'B−V to' },
] as const;

/** Which programme, which solution, which stars; a form of the address, so that it works without scripts and can be linked to. */
export function ResultsFilter({ page, query }: ResultsFilterProps) {
  const { night, programmes, programme, solutions } = page;
  const shown = 'why' in page.result ? null : page.result.origin.solution;
  const all = resultsAddress(night, {
    ...(programme === null ? {} : { programme }),
    ...(query.solution === undefined ? {} : { solution: query.solution }),
  });
  return (
    <form
      // Made anew when the address changes: its fields show what is asked for.
      key={JSON.stringify(query)}
      action={`/nights/${night}/results`}
      noValidate
      role="search"
      aria-label="Narrow the list of stars"
      className="flex flex-wrap items-end gap-3 border-b border-rule bg-sunk px-3.5 py-2.5"
    >
      <Hidden query={query} />
      <Field label="Programme" className="w-60">
        {(control) => (
          <Select
            {...control}
            name="programme"
            defaultValue={programme ?? ''}
            choices={programmes.map(({ code, title }) => ({
              value: code,
              label: code === '' ? 'targets of no programme' : `${code}, ${title}`,
            }))}
          />
        )}
      </Field>
      {solutions.length < 2 ? null : (
        <Field label="Solution" className="w-44">
          {(control) => (
            <Select
              {...control}
              name="solution"
              defaultValue={shown ?? ''}
              choices={solutions.map(({ id, number, state }) => ({
                value: id,
                label: `${number}, ${state}`,
              }))}
            />
          )}
        </Field>
      )}
      <Field label="Star" className="w-32">
        {(control) => <TextInput {...control} name="star" defaultValue={query.star} />}
      </Field>
      {limits.map(({ name, label }) => (
        <Field key={name} label={label} className="w-20">
          {(control) => (
            <NumberInput
              {...control}
              name={name}
              defaultValue={query[name] === undefined ? '' : formatPlain(query[name])}
            />
          )}
        </Field>
      ))}
      <Checkbox
        name="clean"
        value="1"
        defaultChecked={query.clean}
        label="Without cautions"
        className="pb-1"
      />
      <Button type="submit">Show</Button>
      <LinkButton href={all satisfies Route} look="quiet">
        All stars
      </LinkButton>
    </form>
  );
}

/** The order stays when the list is narrowed. */
function Hidden({ query }: { readonly query: CalibratedPageQuery }) {
  return (
    <>
      {query.sort === undefined ? null : <input type="hidden" name="sort" value={query.sort} />}
      {query.descending === true ? <input type="hidden" name="descending" value="1" /> : null}
    </>
  );
}
