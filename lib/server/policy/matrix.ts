import 'server-only';
import type { Caller, PersonCaller } from './caller';
import { Fault } from '@/lib/faults/fault';

/** What a right is about, as far as the rule needs to know it. */
export interface Subject {
  /** Observers of the night concerned. */
  readonly observerIds?: readonly number[];
  /** Programmes with frames in the night concerned, or the programme itself. */
  readonly programmeIds?: readonly number[];
  /** The person the thing belongs to: an upload, a job, an audit row, a token. */
  readonly ownerId?: number | null;
}

type Rule = (caller: PersonCaller, subject: Subject) => boolean;

const manager: Rule = (caller) => caller.roles.has('manager');
const photometrist: Rule = (caller) => caller.roles.has('photometrist');
const observer: Rule = (caller) => caller.roles.has('observer');
const ownNight: Rule = (caller, { observerIds }) =>
  caller.roles.has('observer') && (observerIds?.includes(caller.personId) ?? false);
const pi: Rule = (caller, { programmeIds }) =>
  programmeIds?.some((id) => caller.programmes.get(id) === 'pi') ?? false;
const investigator: Rule = (caller, { programmeIds }) =>
  programmeIds?.some((id) => caller.programmes.has(id)) ?? false;
const owner: Rule = (caller, { ownerId }) => ownerId === caller.personId;
const anybody: Rule = () => true;
const any =
  (...rules: readonly Rule[]): Rule =>
  (caller, subject) =>
    rules.some((rule) => rule(caller, subject));

/** The rules. What is not named here nobody may do. */
const rules = {
  'people.manage': manager,
  'people.see': any(manager, photometrist),
  'programme.manage': manager,
  'programme.see': any(manager, photometrist, observer, investigator),
  'equipment.see': anybody,
  'equipment.manage': any(manager, photometrist),
  'site.manage': manager,
  'settings.manage': manager,
  'standards.see': anybody,
  'night.see': any(manager, photometrist, observer, investigator),
  'night.open': any(manager, photometrist, observer),
  'night.log': any(manager, photometrist, ownNight),
  'night.close': any(manager, photometrist, ownNight),
  'night.reopen': any(manager, photometrist, ownNight),
  'measurements.upload': any(photometrist, ownNight, pi),
  'measurements.refuse': any(photometrist, owner),
  'measurements.see': any(manager, photometrist, ownNight, investigator),
  'mapping.save': any(photometrist, ownNight, pi),
  'solution.see': any(manager, photometrist, ownNight, investigator),
  'solution.solve': any(photometrist, ownNight),
  'solution.comment': any(manager, photometrist, ownNight),
  'solution.exclude': photometrist,
  'solution.propose': photometrist,
  'solution.approve': photometrist,
  'solution.withdraw': photometrist,
  'solution.transform': any(manager, photometrist),
  'calibrated.see': any(manager, photometrist, ownNight, investigator),
  'release.publish': any(photometrist, pi),
  'release.end-proprietary-period': pi,
  'audit.see': any(manager, owner, investigator),
  'job.see': any(manager, owner, investigator),
  'job.cancel': any(manager, owner),
  'job.retry': manager,
  'account.change': anybody,
  'token.make': anybody,
  'token.revoke': any(manager, owner),
  'mail.see': manager,
} as const satisfies Record<string, Rule>;

export type Right = keyof typeof rules;
export const rights = Object.keys(rules) as readonly Right[];

/** Rights that change nothing: all that a read-only token may use. */
const reading: ReadonlySet<Right> = new Set(rights.filter((right) => right.endsWith('.see')));

/** Whether the caller has the right on the subject. A job acts with the rights of the system. */
export function may(caller: Caller, right: Right, subject: Subject = {}): boolean {
  if (caller.kind === 'job') return true;
  if (!reading.has(right) && !caller.scopes.has('write')) return false;
  return rules[right](caller, subject);
}

/** Refuses unless the caller has the right. Use it where the caller may know that the subject exists. */
export function demand(caller: Caller, right: Right, subject: Subject = {}): void {
  if (may(caller, right, subject)) return;
  const readOnly = caller.kind === 'person' && !reading.has(right) && !caller.scopes.has('write');
  throw new Fault(
    'not-allowed',
    readOnly
      ? 'This API token may only read. Make one with the scope “write”.'
      : `You do not have the right for this (${right}).`,
  );
}
