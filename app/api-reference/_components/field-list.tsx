import { Fragment } from 'react';
import type { ReferenceField } from '@/lib/contracts/api/reference';
import { Prose } from './prose';
import { TypeText } from './type-text';

interface FieldListProps {
  readonly fields: readonly ReferenceField[];
  /** Answers have no optional fields to speak of; requests and parameters have. */
  readonly marksRequired?: boolean;
}

/** Names, types and meanings: side by side where there is room, under each other where there is not. */
export function FieldList({ fields, marksRequired = true }: FieldListProps) {
  return (
    <dl className="grid grid-cols-[minmax(0,1fr)] gap-x-4 text-table md:grid-cols-[minmax(8rem,max-content)_minmax(0,1fr)]">
      {fields.map((field) => (
        <Fragment key={`${field.in} ${field.name}`}>
          <dt className="border-t border-rule pt-1.5 font-mono wrap-anywhere md:pb-1.5">
            {field.name}
            {field.in === '' ? null : (
              <span className="ml-1.5 font-sans text-small text-ink-2">in {field.in}</span>
            )}
          </dt>
          <dd className="min-w-0 pb-1.5 md:border-t md:border-rule md:pt-1.5">
            <span className="text-small text-ink-2">
              <TypeText type={field.type} />
              {marksRequired ? (field.isRequired ? ' · required' : ' · optional') : null}
            </span>
            {field.description === '' ? null : (
              <span className="block">
                <Prose text={field.description} />
              </span>
            )}
          </dd>
        </Fragment>
      ))}
    </dl>
  );
}
