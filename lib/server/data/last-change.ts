import 'server-only';
import { selectOne, type Tx } from './database';

interface LastChange {
  readonly act: string;
  readonly utc: Date;
  /** Null when a job did it on nobody's behalf. */
  readonly name: string | null;
}

/** Who last did one of the acts to the subject, by the audit trail. */
async function lastChange(
  tx: Tx | null,
  subject: { readonly kind: string; readonly publicId: string },
  acts: readonly string[],
): Promise<LastChange | null> {
  return selectOne<LastChange>(
    `SELECT a.act, a.utc, p.name FROM audit_events a LEFT JOIN people p ON p.id = a.person_id
      WHERE a.subject_kind = :kind AND a.subject_id = :publicId AND a.act IN (:acts)
      ORDER BY a.id DESC LIMIT 1`,
    { ...subject, acts },
    tx,
  );
}

/** The same in words for a refusal: “by Noor Hathaway at 2026-11-04 06:12:33 UTC”; empty when nothing is known. */
export async function lastChangeWords(
  tx: Tx | null,
  subject: { readonly kind: string; readonly publicId: string },
  acts: readonly string[],
): Promise<string> {
  const change = await lastChange(tx, subject, acts);
  if (!change) return '';
  return ` by ${change.name ?? 'a job'} at ${change.utc.toISOString().slice(0, 19).replace('T', ' ')} UTC`;
}
