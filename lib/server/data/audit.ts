import 'server-only';
import { execute, type Tx } from './database';
import type { Caller } from '@/lib/server/policy/caller';

/** Who an audit row names: a caller, or nobody for what happens at the door before sign-in. */
export type Actor = Pick<Caller, 'personId' | 'requestId'>;

export interface AuditEntry {
  /** What was done, as noun.verb: `night.close`. */
  readonly act: string;
  readonly subjectKind: string;
  /** Public id, or another name that stays. */
  readonly subjectId: string;
  readonly nightId?: number | null;
  readonly programmeId?: number | null;
  readonly reason?: string;
  readonly before?: object | null;
  readonly after?: object | null;
}

/** Adds a row to the audit trail within the change it tells of. */
export async function recordAudit(tx: Tx, actor: Actor, entry: AuditEntry): Promise<void> {
  await execute(
    `INSERT INTO audit_events
       (person_id, act, subject_kind, subject_id, night_id, programme_id, reason, before_values, after_values, request_id)
     VALUES (:person, :act, :kind, :subject, :night, :programme, :reason, :before, :after, :request)`,
    {
      person: actor.personId,
      act: entry.act,
      kind: entry.subjectKind,
      subject: entry.subjectId,
      night: entry.nightId ?? null,
      programme: entry.programmeId ?? null,
      reason: entry.reason ?? '',
      before: entry.before ? JSON.stringify(entry.before) : null,
      after: entry.after ? JSON.stringify(entry.after) : null,
      request: actor.requestId,
    },
    tx,
  );
}
