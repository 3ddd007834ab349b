import type { Route } from 'next';
import { Button } from '@/app/_components/ui/button';
import { DateInput } from '@/app/_components/ui/date-input';
import { Field } from '@/app/_components/ui/field';
import { LinkButton } from '@/app/_components/ui/link-button';
import { Select } from '@/app/_components/ui/select';
import { TextInput } from '@/app/_components/ui/text-input';
import { auditSubjects, type AuditQuery } from '@/lib/contracts/audit';

interface AuditFilterProps {
  readonly query: AuditQuery;
  readonly people: readonly { readonly publicId: string; readonly name: string }[];
}

/** Narrows the trail by its address; night and subject come from links on other pages and are kept. */
export function AuditFilter({ query, people }: AuditFilterProps) {
  return (
    <form
      action="/audit"
      noValidate
      role="search"
      aria-label="Narrow the audit trail"
      className="flex flex-wrap items-end gap-3 border-b border-rule bg-sunk px-3.5 py-2.5"
    >
      {query.night === undefined ? null : <input type="hidden" name="night" value={query.night} />}
      {query.subject === undefined ? null : <input type="hidden" name="subject" value={query.subject} />}
      <Field label="About" className="w-44">
        {(control) => (
          <Select
            {...control}
            name="about"
            defaultValue={query.about ?? ''}
            choices={[
              { value: '', label: 'everything' },
              ...Object.entries(auditSubjects).map(([value, label]) => ({ value, label })),
            ]}
          />
        )}
      </Field>
      {people.length === 0 ? null : (
        <Field label="By" className="w-44">
          {(control) => (
            <Select
              {...control}
              name="person"
              defaultValue={query.person ?? ''}
              choices={[
                { value: '', label: 'anybody' },
                ...people.map(({ publicId, name }) => ({ value: publicId, label: name })),
              ]}
            />
          )}
        </Field>
      )}
      <Field label="Programme" className="w-36">
        {(control) => (
          <TextInput {...control} mono name="programme" maxLength={32} defaultValue={query.programme ?? ''} />
        )}
      </Field>
      <Field label="From, UTC" className="w-32">
        {(control) => <DateInput {...control} name="from" defaultValue={query.from} />}
      </Field>
      <Field label="To, UTC" className="w-32">
        {(control) => <DateInput {...control} name="to" defaultValue={query.to} />}
      </Field>
      <Button type="submit">Show</Button>
      <LinkButton href={'/audit' as Route} look="quiet">
        The whole trail
      </LinkButton>
    </form>
  );
}
