import type { FaultCode, Issue } from '@/lib/faults/fault';

/** A fault as a component gets it. `bug` stands for everything that is not the person's concern but its reference. */
export interface FaultValue {
  readonly code: FaultCode | 'bug';
  readonly detail: string;
  readonly issues: readonly Issue[];
  readonly reference: string;
  /** What was typed, but for secrets, so that a form without scripts can show it again. */
  readonly typed: Readonly<Record<string, string>>;
}

/** What a server action returns; it never throws at a component. */
export type ActionResult<T = unknown> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly fault: FaultValue };
