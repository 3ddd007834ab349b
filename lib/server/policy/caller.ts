import 'server-only';
import type { ObservatoryRole, ProgrammeRole } from '@/lib/contracts/roles';

/** Who asks: a person, by session or token, or a job. Every act and read takes one first. */
export type Caller = PersonCaller | JobCaller;

export interface PersonCaller {
  readonly kind: 'person';
  readonly personId: number;
  readonly publicId: string;
  readonly name: string;
  readonly email: string;
  readonly roles: ReadonlySet<ObservatoryRole>;
  /** Programme's internal id to the person's role in it. */
  readonly programmes: ReadonlyMap<number, ProgrammeRole>;
  /** How the person came in; a token may carry fewer rights than its owner. */
  readonly via: 'session' | 'token';
  /** What a token may do; a session may do all that its person may. */
  readonly scopes: ReadonlySet<TokenScope>;
  readonly requestId: string;
}

/** A job runs with the system's rights inside the act that queued it; that act asked for the right. */
export interface JobCaller {
  readonly kind: 'job';
  readonly jobId: string;
  /** The person whose act queued it, for the audit trail. */
  readonly personId: number | null;
  readonly requestId: string;
  /** Which hold of the job this is: an act that must not happen twice asks `demandLease` with it. */
  readonly lease?: { readonly owner: string; readonly attempt: number };
}

/** Who stands at the door: nobody yet. Only what leads to sign-in takes a visitor instead of a caller. */
export interface Visitor {
  readonly requestId: string;
  /** Network address, as far as it is known. */
  readonly address: string;
  /** The browser's own name for itself. */
  readonly userAgent: string;
}

export const tokenScopes = ['read', 'write'] as const;
export type TokenScope = (typeof tokenScopes)[number];

/** The person for an audit row; null when a job acts on nobody's behalf. */
export function actorOf(caller: Caller): number | null {
  return caller.personId;
}
