import type { Sequelize } from 'sequelize';
import type { z } from 'zod';
import { SolveOptions } from '@/lib/contracts/solve-options';
import { isFault } from '@/lib/faults/fault';
import { approveSolution } from '@/lib/server/acts/approve-solution';
import { proposeSolution } from '@/lib/server/acts/propose-solution';
import { queueSolve } from '@/lib/server/acts/queue-solve';
import { callerOf } from '@/lib/server/identity/caller';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { Job } from '../../models/job';
import { MeasurementSet } from '../../models/measurement-set';
import { Night } from '../../models/night';
import { Person } from '../../models/person';
import { Solution } from '../../models/solution';

/** How far the demo's people have come with each night: the last act is what a visitor finds to do next. */
const decisions = [
  {
    night: '2026-10-17',
    propose: 'Residuals without structure; extinction as usual for October.',
    approve: 'Agreed. The two nights of Thistle 3 can be joined now.',
  },
  {
    night: '2026-11-03',
    first: { bands: ['B', 'V'] },
    propose: 'Clear all night and it shows. SA 101 near the Moon fits as well.',
  },
  { night: '2026-11-08' },
] as const satisfies readonly (Omit<Decision, 'night'> & { readonly night: string })[];

export interface DecideOptions {
  /** E-mail of who solves and proposes, and of who approves. */
  readonly photometrist: string;
  readonly approver: string;
  /** How long to wait for one job of the running application [ms]. */
  readonly patience_ms: number;
}

/**
 * Solves, proposes and approves the demo's nights in the names of its people, by the acts that everybody's presses go
 * through; the jobs in between are done by the application, which must be running. A night that anybody has solved is
 * left alone. Says what it did.
 */
export async function decideNights(sequelize: Sequelize, options: DecideOptions): Promise<string> {
  await sequelize.authenticate();
  const people = await Promise.all([options.photometrist, options.approver].map(callerByEmail));
  const [photometrist, approver] = people;
  // Somebody may have closed an account while trying the program out.
  if (!photometrist || !approver) return 'The demo’s photometrists are gone: nothing decided.';
  const wait = (job: string): Promise<boolean> => hasEndedWell(job, options.patience_ms);
  const done: string[] = [];
  for (const decision of decisions) {
    const night = await Night.findOne({ where: { date: decision.night } });
    if (night === null || (await Solution.count({ where: { nightId: night.id } })) > 0) continue;
    if (!(await setsAreMatched(night.id, options.patience_ms))) break;
    try {
      if (!(await decide({ ...decision, night }, { photometrist, approver, wait, done }))) break;
    } catch (error) {
      // Whoever tries the program out may have been here first: what they did stays.
      if (!isFault(error)) throw error;
      done.push(`refused: ${error.message}`);
    }
  }
  return `Demo nights: ${done.length === 0 ? 'nothing to decide' : done.join(', ')}.`;
}

interface Decision {
  readonly night: Night;
  /** Options of a solve before the one that counts: there is something to compare with then. */
  readonly first?: z.input<typeof SolveOptions>;
  readonly propose?: string;
  readonly approve?: string;
}

interface Deciding {
  readonly photometrist: PersonCaller;
  readonly approver: PersonCaller;
  /** Whether the job came to be done in time. */
  readonly wait: (job: string) => Promise<boolean>;
  /** Grows by what was done. */
  readonly done: string[];
}

/** Takes one night as far as its decision says; false when the application did not do a job in time. */
async function decide(
  { night, first, propose, approve }: Decision,
  { photometrist, approver, wait, done }: Deciding,
): Promise<boolean> {
  const late = `${night.date} left waiting: the application did not do its jobs in time`;
  if (first !== undefined) {
    const earlier = await queueSolve(photometrist, night.publicId, SolveOptions.parse(first));
    if (!(await wait(earlier.job))) return (done.push(late), false);
  }
  const { solution, job } = await queueSolve(photometrist, night.publicId, SolveOptions.parse({}));
  if (!(await wait(job))) return (done.push(late), false);
  done.push(`${night.date} solved`);
  if (propose === undefined) return true;
  await proposeSolution(photometrist, solution, { comment: propose });
  done.push('proposed');
  if (approve === undefined) return true;
  await approveSolution(approver, solution, { comment: approve });
  done.push('approved');
  const transformation = await Job.findOne({
    where: { kind: 'transform-targets', nightId: night.id },
    order: [['id', 'DESC']],
  });
  if (transformation === null || (await wait(transformation.publicId))) return true;
  return (done.push(late), false);
}

async function callerByEmail(email: string): Promise<PersonCaller | null> {
  const person = await Person.findOne({ where: { email } });
  return person && callerOf(person.id, { via: 'session', requestId: 'demo' });
}

async function until(isSo: () => Promise<boolean>, patience_ms: number): Promise<boolean> {
  const end = Date.now() + patience_ms;
  while (!(await isSo())) {
    if (Date.now() > end) return false;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  return true;
}

const setsAreMatched = (nightId: number, patience_ms: number): Promise<boolean> =>
  until(
    async () => (await MeasurementSet.count({ where: { nightId, state: ['received', 'checked'] } })) === 0,
    patience_ms,
  );

async function hasEndedWell(publicId: string, patience_ms: number): Promise<boolean> {
  const state = async (): Promise<string> =>
    (await Job.findOne({ where: { publicId }, rejectOnEmpty: true })).state;
  await until(async () => !['queued', 'running'].includes(await state()), patience_ms);
  return (await state()) === 'done';
}
