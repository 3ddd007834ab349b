import { z } from 'zod';
import { ConditionInput } from '@/lib/contracts/api/condition';
import { FrameInput } from '@/lib/contracts/api/frame';
import { RemarkInput } from '@/lib/contracts/api/remark';
import { TimeLossInput } from '@/lib/contracts/api/time-loss';

/** What the log sends: each kind to its own call. */
export const Outgoing = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('frame'), body: FrameInput }),
  z.object({ kind: z.literal('condition'), body: ConditionInput }),
  z.object({ kind: z.literal('remark'), body: RemarkInput }),
  z.object({ kind: z.literal('time-loss'), body: TimeLossInput }),
]);
export type Outgoing = z.infer<typeof Outgoing>;

const Refused = z.object({
  detail: z.string(),
  issues: z.array(z.object({ path: z.string(), message: z.string() })),
});

/** One log entry on its way: kept in the browser until the server has it. */
export const QueueEntry = z.object({
  /** Idempotency-Key: however often it is sent, it is logged once. */
  key: z.string(),
  /** Id of the person who made it: it is sent under no other name. */
  person: z.string(),
  personName: z.string(),
  /** Id of the night. */
  night: z.string(),
  /** “3 November 2026, larkspur” */
  nightName: z.string(),
  /** ISO 8601 */
  madeAt: z.string(),
  outgoing: Outgoing,
  /** Why the server will not have it; null while it waits. */
  refused: Refused.nullable(),
});
export type QueueEntry = z.infer<typeof QueueEntry>;

/** The next entry to send for a person: the oldest that was not refused. */
export function nextToSend(entries: readonly QueueEntry[], person: string): QueueEntry | null {
  return entries.find((entry) => entry.person === person && entry.refused === null) ?? null;
}

/** Seconds until the next attempt after so many failures in a row. */
export function pause_s(failures: number): number {
  return Math.min(30, 2 ** Math.min(failures, 5));
}

/** One entry in words, for the list of what waits. */
export function entryWords({ outgoing }: QueueEntry): string {
  switch (outgoing.kind) {
    case 'frame': {
      const { number, type, object, band } = outgoing.body;
      return [`Frame ${number ?? '?'}`, type, object, band].filter(Boolean).join(', ');
    }
    case 'condition':
      return `Conditions at ${outgoing.body.utc.slice(11, 16)} UTC`;
    case 'remark':
      return `Remark: ${outgoing.body.text.slice(0, 60)}`;
    case 'time-loss':
      return `Time lost: ${outgoing.body.minutes} min, ${outgoing.body.cause}`;
  }
}
