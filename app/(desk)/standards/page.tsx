import type { Metadata } from 'next';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { listStandards } from '@/lib/server/reads/list-standards';
import { standardFields } from '@/lib/server/reads/standard-fields';
import { FieldTable } from './_components/field-table';
import { FieldTabs, shownFields, viewOf } from './_components/field-tabs';
import { SourcePanel } from './_components/source-panel';
import { StandardsFilter } from './_components/standards-filter';
import { StarHits } from './_components/star-hits';

export const metadata: Metadata = { title: 'Standards' };

const one = (value: string | string[] | undefined): string | undefined =>
  (Array.isArray(value) ? value[0] : value)?.trim().slice(0, 80) || undefined;

const mostHits = 200;

/** A server's page is made once, at its time. */
async function presentTime(): Promise<number> {
  return Date.now();
}

export default async function StandardsPage({ searchParams }: PageProps<'/standards'>) {
  const caller = await callerOrSignIn();
  const query = await searchParams;
  const [name, telescope] = [one(query['name']), one(query['telescope'])];
  const now = await presentTime();
  const [list, hits] = await Promise.all([
    standardFields(caller, { telescope, now }),
    name === undefined ? null : listStandards(caller, { name, limit: mostHits }),
  ]);
  const stars = list.fields.reduce((sum, { nStars }) => sum + nStars, 0);
  const view = viewOf(one(query['show']));
  return (
    <>
      <PageHead title="Standards">
        <span className="text-ink-2">
          {stars} stars in {list.fields.length} fields
        </span>
      </PageHead>
      <StandardsFilter name={name ?? ''} telescopes={list.telescopes} telescope={list.telescope?.code} />
      {hits === null || name === undefined ? null : (
        <Panel title={`Stars named like “${name}”`} className="mb-4" flush>
          <StarHits hits={hits} />
        </Panel>
      )}
      {list.fields.length === 0 ? (
        <Panel>
          <EmptyState title="No standard stars yet">
            They are loaded with the reference data when the service is set up.
          </EmptyState>
        </Panel>
      ) : (
        <>
          <FieldTabs view={view} fields={list.fields} telescope={telescope} />
          <FieldTable list={list} fields={shownFields(list.fields, view)} telescope={telescope} />
          <SourcePanel sources={list.sources} />
        </>
      )}
    </>
  );
}
