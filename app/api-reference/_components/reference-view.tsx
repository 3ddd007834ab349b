'use client';

import { useRef, useState } from 'react';
import { useShortcut } from '@/app/_components/hooks/use-shortcut';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { Field } from '@/app/_components/ui/field';
import { Panel } from '@/app/_components/ui/panel';
import { TextInput } from '@/app/_components/ui/text-input';
import type { ReferenceSection } from '@/lib/contracts/api/reference';
import { OperationItem } from './operation-item';

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** Every call by what it is about; a search leaves those that hold all of its words. */
export function ReferenceView({ sections }: { readonly sections: readonly ReferenceSection[] }) {
  const [query, setQuery] = useState('');
  const input = useRef<HTMLInputElement>(null);
  useShortcut('/', () => input.current?.focus());
  const wanted = query.toLowerCase().split(/\s+/).filter(Boolean);
  const found = sections
    .map((section) => ({
      ...section,
      operations: section.operations.filter(({ words }) => wanted.every((word) => words.includes(word))),
    }))
    .filter(({ operations }) => operations.length > 0);
  const count = found.reduce((sum, { operations }) => sum + operations.length, 0);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-4">
      <Field label="Search the calls" hint={`Words of a path, a summary or a field. ${count} found.`}>
        {(control) => (
          <TextInput
            {...control}
            ref={input}
            type="search"
            aria-keyshortcuts="/"
            className="max-w-96"
            value={query}
            onChange={(event) => setQuery(event.target.value)}
          />
        )}
      </Field>
      {found.map(({ tag, description, operations }) => (
        <Panel key={tag} title={capital(tag)} note={description} flush>
          {operations.map((operation) => (
            <OperationItem key={operation.id} operation={operation} />
          ))}
        </Panel>
      ))}
      {count === 0 ? (
        <EmptyState title="No call has all of these words">
          Search for fewer, or for a part of one.
        </EmptyState>
      ) : null}
    </div>
  );
}
