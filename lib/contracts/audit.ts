import { z } from 'zod';
import { CalendarDate, PublicId } from './common';

/** What the audit trail is about, each with the word that people read. */
export const auditSubjects = {
  night: 'nights',
  frame: 'frames',
  condition: 'conditions',
  remark: 'remarks',
  'time-loss': 'time lost',
  'measurement-set': 'measurement sets',
  solution: 'solutions',
  telescope: 'telescopes',
  site: 'sites',
  observatory: 'settings',
  programme: 'programmes',
  person: 'people',
  token: 'API tokens',
  job: 'jobs',
} as const satisfies Record<string, string>;
export type AuditSubject = keyof typeof auditSubjects;

/** How the trail is narrowed; an address carries it, so a part that cannot be read is left out rather than refused. */
const parts = {
  night: PublicId,
  programme: z.string().min(1).max(32),
  person: PublicId,
  about: z.enum(Object.keys(auditSubjects) as [AuditSubject, ...AuditSubject[]]),
  subject: z.string().min(1).max(64),
  from: CalendarDate,
  to: CalendarDate,
  after: z.string().max(200),
} as const;

export type AuditQuery = { readonly [Part in keyof typeof parts]?: z.output<(typeof parts)[Part]> };

export function readAuditQuery(
  values: Readonly<Record<string, string | readonly string[] | undefined>>,
): AuditQuery {
  const read = Object.entries(parts).flatMap(([name, schema]) => {
    const parsed = schema.safeParse(values[name]);
    return parsed.success ? [[name, parsed.data]] : [];
  });
  return Object.fromEntries(read) as AuditQuery;
}

export function auditAddress(
  query: AuditQuery,
  change: Partial<Record<keyof AuditQuery, undefined | string>>,
): string {
  const params = new URLSearchParams();
  for (const [name, value] of Object.entries({ ...query, ...change })) {
    if (value !== undefined) params.set(name, value);
  }
  const search = params.toString();
  return search === '' ? '/audit' : `/audit?${search}`;
}

/** One act, as the trail shows it. */
export interface AuditRow {
  readonly id: number;
  readonly utc: Date;
  /** Null for what the system did of its own accord. */
  readonly person: string | null;
  readonly act: string;
  readonly subjectKind: string;
  readonly subjectId: string;
  readonly night: string | null;
  readonly nightDate: string | null;
  readonly telescope: string | null;
  readonly programme: string | null;
  readonly reason: string;
  readonly before: Readonly<Record<string, unknown>> | null;
  readonly after: Readonly<Record<string, unknown>> | null;
}
