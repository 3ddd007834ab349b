import type { Metadata } from 'next';
import { headers } from 'next/headers';
import { PageHead } from '@/app/_components/ui/page-head';
import { openApiDocument } from '@/lib/contracts/api/openapi-document';
import { referenceOf, type Reference } from '@/lib/contracts/api/reference';
import { Basics } from './_components/basics';
import { ReferenceView } from './_components/reference-view';
import { SchemaList } from './_components/schema-list';

export const metadata: Metadata = {
  title: 'HTTP interface',
  description: 'Every call of the HTTP interface, version 1, made from the schemas that validate it',
};

let made: Reference | undefined;

/** Open to everybody: the document that it shows is open too. */
export default async function ApiReferencePage() {
  const reference = (made ??= referenceOf(openApiDocument()));
  const asked = await headers();
  const address = `${asked.get('x-forwarded-proto') ?? 'http'}://${asked.get('host') ?? '127.0.0.1'}`;
  const calls = reference.sections.reduce((sum, { operations }) => sum + operations.length, 0);
  return (
    <>
      <PageHead title="HTTP interface">
        <span className="text-ink-2">
          version 1, {calls} calls, as{' '}
          <a href="/api/v1/openapi.json" className="underline">
            an OpenAPI 3.1 document
          </a>
        </span>
      </PageHead>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-4">
        <Basics address={address} />
        <ReferenceView sections={reference.sections} />
        <SchemaList schemas={reference.schemas} />
      </div>
    </>
  );
}
