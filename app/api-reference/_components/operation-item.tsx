import type { ReactNode } from 'react';
import type { ReferenceOperation } from '@/lib/contracts/api/reference';
import { CodeBlock } from './code-block';
import { Disclosure } from './disclosure';
import { FieldList } from './field-list';
import { Prose } from './prose';
import { TypeText } from './type-text';

/** One call: what it does, what it takes, what it answers, what it refuses, and how to try it. */
export function OperationItem({ operation }: { readonly operation: ReferenceOperation }) {
  const { id, method, path, summary, description, isOpen, parameters, body, answer, refusals, curl } =
    operation;
  return (
    <Disclosure
      id={id}
      summary={
        <span className="grid min-w-0 flex-1 gap-x-4 md:grid-cols-[minmax(0,26rem)_minmax(0,1fr)]">
          <span className="font-mono wrap-anywhere">
            <span className="mr-2 inline-block w-14 font-medium">{method}</span>
            {path}
          </span>
          <span className="text-ink-2">
            {summary}
            {isOpen ? ' (open)' : ''}
          </span>
        </span>
      }
    >
      <div className="grid grid-cols-[minmax(0,1fr)] gap-4">
        {description === '' ? null : (
          <p className="max-w-prose">
            <Prose text={description} />
          </p>
        )}
        {parameters.length === 0 ? null : (
          <Part title="Parameters">
            <FieldList fields={parameters} />
          </Part>
        )}
        {body === null ? null : (
          <Part title="Body" note={body.mediaTypes.join(', ')}>
            <p className="pb-1">
              <TypeText type={body.type} />
            </p>
            <FieldList fields={body.fields} />
          </Part>
        )}
        {answer === null ? null : (
          <Part title={`Answer ${answer.status}`} note={answer.mediaTypes.join(', ')}>
            <p className="pb-1">{answer.type.length === 0 ? 'Nothing.' : <TypeText type={answer.type} />}</p>
            <FieldList fields={answer.fields} marksRequired={false} />
          </Part>
        )}
        <Part title="Refusals">
          <p className="font-mono">{refusals.join(' ')}</p>
        </Part>
        <CodeBlock label="Try it" code={curl} />
      </div>
    </Disclosure>
  );
}

interface PartProps {
  readonly title: string;
  readonly note?: string;
  readonly children: ReactNode;
}

function Part({ title, note, children }: PartProps) {
  return (
    <section>
      <h3 className="pb-1 text-table font-semibold">
        {title}
        {note === undefined ? null : <span className="ml-2 font-normal text-ink-2">{note}</span>}
      </h3>
      {children}
    </section>
  );
}
