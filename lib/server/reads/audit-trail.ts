import 'server-only';
import type { AuditQuery, AuditRow } from '@/lib/contracts/audit';
import { listAuditRows, peopleInAudit } from '@/lib/server/data/audit-events';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { ownScope } from '@/lib/server/policy/scope';

const perPage = 100;

export interface AuditTrail {
  readonly rows: readonly AuditRow[];
  readonly next: string | null;
  /** Choices of the filter; empty for those who see only what is theirs. */
  readonly people: readonly { readonly publicId: string; readonly name: string }[];
  readonly seesAll: boolean;
}

/** A page of the audit trail as far as the caller may see it. */
export async function auditTrail(caller: PersonCaller, query: AuditQuery): Promise<AuditTrail> {
  const scope = ownScope(caller);
  const [{ rows, next }, people] = await Promise.all([
    listAuditRows(scope, query, perPage),
    peopleInAudit(scope),
  ]);
  return { rows, next, people, seesAll: scope.all };
}
