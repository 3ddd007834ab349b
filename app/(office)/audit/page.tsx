import type { Metadata, Route } from 'next';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { LinkButton } from '@/app/_components/ui/link-button';
import { PageHead } from '@/app/_components/ui/page-head';
import { Pagination } from '@/app/_components/ui/pagination';
import { Panel } from '@/app/_components/ui/panel';
import { auditAddress, readAuditQuery } from '@/lib/contracts/audit';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { auditTrail } from '@/lib/server/reads/audit-trail';
import { AuditFilter } from './_components/audit-filter';
import { AuditTable } from './_components/audit-table';

export const metadata: Metadata = { title: 'Audit trail' };

export default async function AuditPage({ searchParams }: PageProps<'/audit'>) {
  const [caller, values] = await Promise.all([callerOrSignIn(), searchParams]);
  const query = readAuditQuery(values);
  const trail = await auditTrail(caller, query);
  const isNarrowed = Object.keys(query).length > 0;
  return (
    <>
      <PageHead title="Audit trail">
        <span className="text-ink-2">
          {trail.seesAll
            ? 'Every change, by whom and why.'
            : 'What you did, and what was done in your programmes.'}{' '}
          Rows are only ever added.
        </span>
      </PageHead>
      <Panel flush>
        <AuditFilter query={query} people={trail.people} />
        {trail.rows.length === 0 ? (
          <EmptyState
            title={isNarrowed ? 'Nothing is like that' : 'Nothing yet'}
            action={
              isNarrowed ? <LinkButton href={'/audit' as Route}>The whole trail</LinkButton> : undefined
            }
          >
            {isNarrowed
              ? 'Widen the dates, or leave the other parts open.'
              : 'Each change of a night, a set, an account or the equipment leaves a row here.'}
          </EmptyState>
        ) : (
          <AuditTable rows={trail.rows} />
        )}
        <Pagination
          noun="rows"
          first={query.after === undefined ? null : (auditAddress(query, { after: undefined }) as Route)}
          next={trail.next === null ? null : (auditAddress(query, { after: trail.next }) as Route)}
        />
      </Panel>
    </>
  );
}
