import { randomBytes } from 'node:crypto';
import { hostname } from 'node:os';
import PQueue from 'p-queue';
import { jobKindNames, type JobKind } from '@/lib/contracts/job-kinds';
import { giveBack } from '@/lib/server/jobs/finish';
import { jobKinds, type Lane } from '@/lib/server/jobs/kinds';
import { leaseJobs, type Lease } from '@/lib/server/jobs/lease';
import { scheduleTidy } from '@/lib/server/jobs/schedule-tidy';
import { onWake } from '@/lib/server/jobs/wake';
import { logger } from '@/lib/server/log/logger';
import type { Handlers } from './handler';
import { giveUpOnOverdue, keepLeases, type Running } from './keep-leases';
import { outageLog } from './outage-log';
import { runJob, stopError } from './run-job';

export interface RunnerOptions {
  readonly handlers: Handlers;
  /** Long jobs at a time. */
  readonly concurrency: number;
  /** Between two looks for work that nobody announced. */
  readonly poll_ms?: number;
  /** Between two looks at whether running jobs were cancelled or lost. */
  readonly keep_ms?: number;
  /** Instead of what the kinds say. */
  readonly lease_s?: number;
}

export interface Runner {
  readonly owner: string;
  /** Takes no more work, gives running jobs `grace_ms` to end, then stops them and gives their leases back. */
  readonly stop: (grace_ms?: number) => Promise<void>;
}

const shortPlaces = 2;
/** Time to notice the stop, after the grace. */
const notice_ms = 3_000;
const tidyEvery_ms = 300_000;

/**
 * Takes jobs from the database by lease and runs them. Any number of runners may work on one database; each job is with
 * one of them. An outage of the database ends nothing: the runner says so once and goes on when it is over.
 */
export function startRunner(options: RunnerOptions): Runner {
  const { handlers, poll_ms = 1_000, keep_ms = 1_000 } = options;
  const owner = `${hostname().slice(0, 32)}:${process.pid}:${randomBytes(6).toString('hex')}`;
  const running = new Set<Running>();
  const lanes: Readonly<Record<Lane, PQueue>> = {
    long: new PQueue({ concurrency: options.concurrency }),
    short: new PQueue({ concurrency: shortPlaces }),
  };
  const outage = outageLog('job queue');
  const looking = new AbortController();
  const keeping = new AbortController();
  const idle = sleeper(looking.signal);
  const watch = sleeper(keeping.signal);

  const start = (lease: Lease, asked_ms: number): void => {
    const job: Running = { lease, stop: new AbortController(), kept_ms: asked_ms };
    running.add(job);
    void lanes[jobKinds[lease.kind].lane].add(async () => {
      await runJob(lease, handlers, job.stop.signal);
      running.delete(job);
      idle.wake();
    });
  };

  /** Whether the queue was asked at all: with every place taken there is nothing to ask for. */
  const takeWork = async (): Promise<boolean> => {
    let isAsked = false;
    for (const [name, lane] of Object.entries(lanes)) {
      const kinds = kindsOf(name as Lane, handlers);
      const limit = lane.concurrency - lane.size - lane.pending;
      if (limit < 1 || kinds.length === 0) continue;
      const asked_ms = performance.now();
      const leases = await leaseJobs({ owner, kinds, limit, lease_s: options.lease_s });
      for (const lease of leases) start(lease, asked_ms);
      isAsked = true;
    }
    return isAsked;
  };

  let tidied_ms = -Infinity;
  const look = loop(looking.signal, async () => {
    try {
      const isAsked = await takeWork();
      if (handlers.tidy && performance.now() - tidied_ms > tidyEvery_ms) {
        await scheduleTidy();
        tidied_ms = performance.now();
      }
      if (isAsked) outage.worked();
    } catch (error) {
      // Whatever keeps it from the queue, the runner must outlive it.
      outage.failed(error);
    }
    await idle.sleep(poll_ms * (0.7 + 0.6 * Math.random()));
  });

  const keep = loop(keeping.signal, async () => {
    try {
      if (running.size > 0) await keepLeases(owner, running);
    } catch (error) {
      // Leases that cannot be extended are given up below, once they have run out.
      outage.failed(error);
    }
    giveUpOnOverdue(running);
    await watch.sleep(keep_ms);
  });

  const unwake = onWake(() => {
    idle.wake();
    watch.wake();
  });
  logger().info({ owner, concurrency: options.concurrency }, 'runner started');

  return {
    owner,
    stop: async (grace_ms = 5_000) => {
      unwake();
      looking.abort();
      await look;
      const drained = Promise.all(Object.values(lanes).map((lane) => lane.onIdle()));
      await settledWithin(drained, grace_ms);
      for (const { stop } of running) stop.abort(stopError('shutdown'));
      await settledWithin(drained, notice_ms);
      keeping.abort();
      await keep;
      await giveBackAll(running);
      logger().info({ owner, left: running.size }, 'runner stopped');
    },
  };
}

const kindsOf = (lane: Lane, handlers: Handlers): readonly JobKind[] =>
  jobKindNames.filter((kind) => jobKinds[kind].lane === lane && handlers[kind] !== undefined);

/** Repeats until the signal fires. */
async function loop(signal: AbortSignal, round: () => Promise<void>): Promise<void> {
  while (!signal.aborted) await round();
}

interface Sleeper {
  /** Until the time is over, somebody wakes it, or the signal fires. */
  readonly sleep: (time_ms: number) => Promise<void>;
  readonly wake: () => void;
}

function sleeper(signal: AbortSignal): Sleeper {
  let end: (() => void) | null = null;
  let isAwake = false;
  const wake = (): void => {
    // A wake-up between two sleeps shortens the next one: the work it announced may have come too late for the last look.
    isAwake = end === null;
    end?.();
  };
  signal.addEventListener('abort', wake);
  return {
    wake,
    sleep: (time_ms) => {
      if (isAwake || signal.aborted) {
        isAwake = false;
        return Promise.resolve();
      }
      return new Promise((resolve) => {
        const timer = setTimeout(() => end?.(), time_ms);
        end = () => {
          clearTimeout(timer);
          end = null;
          resolve();
        };
      });
    },
  };
}

/** Work that did not notice the stop in time is given to the next runner all the same; its own end then counts for nothing. */
async function giveBackAll(running: ReadonlySet<Running>): Promise<void> {
  for (const { lease } of running) {
    try {
      await giveBack(lease);
    } catch (error) {
      // Not worth waiting for at a shutdown: the lease runs out by itself.
      logger().warn({ err: error, job: lease.publicId }, 'a job could not be given back');
    }
  }
}

async function settledWithin(work: Promise<unknown>, time_ms: number): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<void>((resolve) => (timer = setTimeout(resolve, time_ms)));
  await Promise.race([work, late]);
  clearTimeout(timer);
}
