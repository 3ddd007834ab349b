import { Panel } from '@/app/_components/ui/panel';
import type { ReferenceSchema } from '@/lib/contracts/api/reference';
import { Disclosure } from './disclosure';
import { FieldList } from './field-list';

/** The forms that calls take and give, by name. */
export function SchemaList({ schemas }: { readonly schemas: readonly ReferenceSchema[] }) {
  return (
    <Panel title="Forms" note="What calls take and give, by name" flush>
      {schemas.map(({ name, description, fields }) => (
        <Disclosure
          key={name}
          id={`schema-${name}`}
          summary={
            <span className="grid min-w-0 flex-1 gap-x-4 md:grid-cols-[minmax(0,26rem)_minmax(0,1fr)]">
              <span className="font-mono">{name}</span>
              <span className="text-ink-2">{description}</span>
            </span>
          }
        >
          <FieldList fields={fields} />
        </Disclosure>
      ))}
    </Panel>
  );
}
