'use client';

import { useEffect, useState } from 'react';
import { hasEnded, type Job } from '@/lib/contracts/api/job';

/** `live`: told as it happens. `asking`: asked from time to time. `lost`: no answer just now; it goes on asking. */
export type JobLink = 'live' | 'asking' | 'lost' | 'ended';
export interface FollowedJob {
  readonly job: Job | null;
  readonly link: JobLink;
}

const events = ['progress', 'done', 'failed', 'cancelled'] as const;
/** The present state comes at once; a stream that is silent for so long is being held back on its way. */
const firstWord_ms = 5_000;
const ask_ms = 2_000;
const longestAsk_ms = 15_000;

/**
 * Follows a job until it ends: by server-sent events, and where those do not come through by asking for it. Outlives a
 * lost link and a restart of the server.
 */
export function useJob(id: string | null, first: Job | null = null): FollowedJob {
  const [followed, setFollowed] = useState<FollowedJob>({ job: first, link: 'asking' });
  useEffect(() => {
    if (id === null) return;
    return followJob(id, (change) => setFollowed((former) => ({ ...former, ...change })));
  }, [id]);
  const job = followed.job?.id === id ? followed.job : first;
  return { job, link: job && hasEnded(job.state) ? 'ended' : followed.link };
}

/** Returns how to stop. */
function followJob(id: string, tell: (change: Partial<FollowedJob>) => void): () => void {
  const address = `/api/v1/jobs/${encodeURIComponent(id)}`;
  const stopping = new AbortController();
  let source: EventSource | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let wait_ms = ask_ms;

  const hear = (job: Job, link: JobLink): void => {
    tell({ job, link });
    if (hasEnded(job.state)) stop();
  };
  const listen = (): void => {
    source = new EventSource(`${address}/events`);
    for (const name of events) {
      source.addEventListener(name, (event: MessageEvent<string>) => {
        clearTimeout(timer);
        wait_ms = ask_ms;
        hear(JSON.parse(event.data) as Job, 'live');
      });
    }
    source.addEventListener('error', () => {
      // A dropped link the browser mends itself; only a refusal closes the source.
      tell({ link: 'lost' });
      if (source?.readyState === EventSource.CLOSED) askLater(true);
    });
    timer = setTimeout(() => {
      source?.close();
      askLater(false);
    }, firstWord_ms);
  };
  /** `mayListen`: once there is an answer again, the stream is worth another try. */
  const askLater = (mayListen: boolean): void => {
    clearTimeout(timer);
    if (!stopping.signal.aborted) timer = setTimeout(() => void ask(mayListen), wait_ms);
  };
  const ask = async (mayListen: boolean): Promise<void> => {
    const job = await present(address, stopping.signal);
    if (stopping.signal.aborted || job === 'gone') return;
    if (job === 'unreachable') {
      tell({ link: 'lost' });
      wait_ms = Math.min(wait_ms * 2, longestAsk_ms);
      askLater(mayListen);
      return;
    }
    wait_ms = ask_ms;
    hear(job, 'asking');
    if (stopping.signal.aborted) return;
    if (mayListen) listen();
    else askLater(false);
  };
  const stop = (): void => {
    stopping.abort();
    clearTimeout(timer);
    source?.close();
  };
  listen();
  return stop;
}

/** `gone`: there is no such job for this person, or the session has ended; asking again is of no use. */
async function present(address: string, signal: AbortSignal): Promise<Job | 'gone' | 'unreachable'> {
  try {
    const response = await fetch(address, { headers: { accept: 'application/json' }, signal });
    if (response.ok) return (await response.json()) as Job;
    return response.status === 401 || response.status === 403 || response.status === 404
      ? 'gone'
      : 'unreachable';
  } catch {
    // Fetch rejects for a dead link and for an abort alike; the caller looks at the signal first.
    return 'unreachable';
  }
}
