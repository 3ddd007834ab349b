import 'server-only';
import type { AuditQuery, AuditRow, AuditSubject } from '@/lib/contracts/audit';
import type { OwnScope } from '@/lib/server/policy/scope';
import { fromCursor, pageOf } from './cursor';
import { select } from './database';

const rows = `SELECT e.id, e.utc, p.name AS person, e.act, e.subject_kind AS subjectKind, e.subject_id AS subjectId,
            n.public_id AS night, DATE_FORMAT(n.date, '%Y-%m-%d') AS nightDate, t.code AS telescope,
            g.code AS programme, e.reason, e.before_values AS \`before\`, e.after_values AS \`after\`
       FROM audit_events e
       LEFT JOIN people p ON p.id = e.person_id
       LEFT JOIN nights n ON n.id = e.night_id
       LEFT JOIN telescopes t ON t.id = n.telescope_id
       LEFT JOIN programmes g ON g.id = e.programme_id`;

/** Audit rows in the scope, the latest first. */
export async function listAuditRows(
  scope: OwnScope,
  query: AuditQuery,
  limit: number,
): Promise<{ readonly rows: readonly AuditRow[]; readonly next: string | null }> {
  const last = fromCursor(query.after, ['number']);
  const found = await select<AuditRow>(
    `${rows}
      WHERE (:all OR e.person_id = :owner OR e.programme_id IN (:programmes))
        AND (:night = '' OR n.public_id = :night)
        AND (:programme = '' OR g.code = :programme)
        AND (:person = '' OR p.public_id = :person)
        AND (:about = '' OR e.subject_kind = :about)
        AND (:subject = '' OR e.subject_id = :subject)
        AND (:from = '' OR e.utc >= :from)
        AND (:to = '' OR e.utc < :to + INTERVAL 1 DAY)
        AND (:after = 0 OR e.id < :after)
      ORDER BY e.id DESC LIMIT :limit`,
    {
      all: scope.all,
      owner: scope.ownerId,
      // No programme has the id 0: an empty list is not valid SQL.
      programmes: scope.programmeIds.length === 0 ? [0] : scope.programmeIds,
      night: query.night ?? '',
      programme: query.programme ?? '',
      person: query.person ?? '',
      about: query.about ?? '',
      subject: query.subject ?? '',
      from: query.from ?? '',
      to: query.to ?? '',
      after: last === null ? 0 : Number(last[0]),
      limit: limit + 1,
    },
  );
  return pageOf(found, limit, ({ id }) => [id]);
}

/** People who stand in the trail, by name: the choices of its filter. */
export async function peopleInAudit(
  scope: OwnScope,
): Promise<readonly { readonly publicId: string; readonly name: string }[]> {
  if (!scope.all) return [];
  return select(
    `SELECT p.public_id AS publicId, p.name FROM people p
      WHERE EXISTS (SELECT 1 FROM audit_events e WHERE e.person_id = p.id) ORDER BY p.name`,
  );
}

/** Everything in the trail about one thing, the latest first. Whoever calls has asked whether the thing may be seen. */
export async function auditOfSubject(kind: AuditSubject, publicId: string): Promise<readonly AuditRow[]> {
  return select<AuditRow>(
    `${rows} WHERE e.subject_kind = :kind AND e.subject_id = :publicId ORDER BY e.id DESC LIMIT 1000`,
    { kind, publicId },
  );
}
