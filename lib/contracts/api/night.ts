import { z } from 'zod';
import { CalendarDate, listOf, Page, PathId, PublicId, Reason, Utc } from '@/lib/contracts/common';
import { operation } from './operation';

/** `calibrated` is reached by the approval of a solution only. */
export const nightStates = ['open', 'closed', 'calibrated'] as const;
export const NightState = z.enum(nightStates);
export type NightState = z.infer<typeof NightState>;

export const TelescopeCode = z
  .string()
  .min(1)
  .max(32)
  .meta({ description: 'Telescope’s code', example: 'larkspur' });

export const PersonName = z
  .object({ id: PublicId, name: z.string() })
  .meta({ id: 'PersonName', description: 'A person, by id and name' });
export type PersonName = z.infer<typeof PersonName>;

const Summary = z.string().trim().max(10_000, 'must be at most 10,000 characters long').meta({
  description: 'The observers’ account of the night',
  example: 'Thin cirrus until 23 UTC, clear afterwards.',
});

export const Night = z
  .object({
    id: PublicId,
    telescope: TelescopeCode,
    date: CalendarDate.meta({ description: 'Local date of the evening' }),
    state: NightState,
    starts_at: Utc.meta({ description: 'Local noon at which the night begins' }),
    ends_at: Utc.meta({ description: 'Local noon at which it ends' }),
    summary: z.string(),
    observers: z.array(PersonName),
    opened_by: z.string().meta({ description: 'Name of the person' }),
    closed_by: z.string().nullable(),
    closed_at: Utc.nullable(),
    reopened_reason: z.string().nullable().meta({ description: 'Why it was opened again, the last time' }),
    version: z.number().int().meta({ description: 'Rises with every change of the night itself' }),
    frames: z.number().int().meta({ description: 'Number of frames that you may see' }),
    conditions: z.number().int(),
    minutes_lost: z.number().int(),
  })
  .meta({ id: 'Night', description: 'One telescope, one local evening date' });
export type Night = z.infer<typeof Night>;

/** What is wrong with an instant that should lie in the night; null when it does. */
export function outsideNight(
  utc: string,
  night: { readonly starts_at: string; readonly ends_at: string },
): string | null {
  const at = Date.parse(utc);
  if (at >= Date.parse(night.starts_at) && at < Date.parse(night.ends_at)) return null;
  return `lies outside the night, which runs from ${night.starts_at} to ${night.ends_at}`;
}

export const NightQuery = Page.extend({
  telescope: TelescopeCode.optional(),
  from: CalendarDate.optional().meta({ description: 'First date' }),
  to: CalendarDate.optional().meta({ description: 'Last date' }),
  state: NightState.optional(),
});
export type NightQuery = z.infer<typeof NightQuery>;

const Observers = z
  .array(PublicId)
  .max(20, 'must be at most 20 people')
  .meta({ description: 'Ids of the people whose night it is' });

export const OpenNight = z
  .strictObject({
    telescope: TelescopeCode,
    date: CalendarDate.meta({ description: 'Local date of the evening' }),
    observers: Observers.optional().meta({ description: 'Ids of the observers; you, if you name nobody' }),
  })
  .meta({ id: 'OpenNight', example: { telescope: 'larkspur', date: '2026-11-03' } });
export type OpenNight = z.infer<typeof OpenNight>;

const version = z.number().int().optional().meta({
  description: 'The version you have read: the change is refused if it is no longer the present one',
});

/** A change of state stands by itself, so that it is one act in the audit trail. */
export const PatchNight = z
  .strictObject({
    state: z
      .enum(['open', 'closed'], 'must be “closed”, to close the night, or “open”, to open it again')
      .optional()
      .meta({ description: '“closed” closes the night, “open” opens it again and needs a reason' }),
    reason: Reason.optional(),
    summary: Summary.optional(),
    observers: Observers.min(1, 'must name at least one person').optional(),
    version,
  })
  .superRefine((patch, context) => {
    const wrong = (path: string, message: string): void =>
      context.addIssue({ code: 'custom', path: path === '' ? [] : [path], message });
    if (patch.state === undefined && patch.summary === undefined && patch.observers === undefined) {
      wrong('', 'Nothing to change: send state, summary or observers.');
    }
    if (patch.state === 'open' && patch.reason === undefined)
      wrong('reason', 'is needed to open a night again');
    if (patch.state !== undefined && patch.observers !== undefined) {
      wrong('observers', 'cannot be changed together with the state: send them first');
    }
    if (patch.state === 'open' && patch.summary !== undefined) {
      wrong('summary', 'cannot be changed while the night is being opened again: send it afterwards');
    }
  })
  .meta({
    id: 'PatchNight',
    example: { state: 'closed', summary: 'Thin cirrus until 23 UTC, clear afterwards.' },
  });
export type PatchNight = z.infer<typeof PatchNight>;

export const CloseNight = z.strictObject({ summary: Summary.optional(), version });
export type CloseNight = z.infer<typeof CloseNight>;
export const ReopenNight = z.strictObject({ reason: Reason, version });
export type ReopenNight = z.infer<typeof ReopenNight>;
export const ChangeNight = z.strictObject({
  summary: Summary.optional(),
  observers: Observers.min(1, 'must name at least one person').optional(),
  version,
});
export type ChangeNight = z.infer<typeof ChangeNight>;

export const NightParams = z.object({ id: PathId.meta({ description: 'Id of the night' }) });

const tag = 'nights';
export const listNights = operation({
  id: 'listNights',
  method: 'get',
  path: '/nights',
  tag,
  summary: 'Nights, the latest first',
  description:
    'Observers, photometrists and managers see every night; investigators those with frames of their programmes.',
  query: NightQuery,
  answer: listOf(Night),
});
export const openNight = operation({
  id: 'openNight',
  method: 'post',
  path: '/nights',
  tag,
  summary: 'Open a night',
  description:
    'There is one night for a telescope and a date; the second attempt is refused and names the first.',
  body: OpenNight,
  answer: Night,
  status: 201,
  faults: ['conflict'],
});
export const getNight = operation({
  id: 'getNight',
  method: 'get',
  path: '/nights/{id}',
  tag,
  summary: 'One night',
  params: NightParams,
  answer: Night,
});
export const patchNight = operation({
  id: 'patchNight',
  method: 'patch',
  path: '/nights/{id}',
  tag,
  summary: 'Close a night, open it again, or change its summary and observers',
  params: NightParams,
  body: PatchNight,
  answer: Night,
  faults: ['conflict', 'stale'],
});
