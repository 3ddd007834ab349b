'use client';

import {
  createContext,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useRef,
  useState,
  useSyncExternalStore,
  type ReactNode,
} from 'react';
import { newKey } from '@/app/_components/hooks/call-api';
import { drainQueue } from './drain-queue';
import { pause_s, type Outgoing, type QueueEntry } from './queue-entry';
import { changeQueue, emptyQueue, followQueue, isQueueKept, readQueue } from './queue-store';
import type { Logged } from './send-entry';

/** How it stands with what waits. */
export type LinkState = 'idle' | 'sending' | 'unreachable' | 'signed-out';

type OnLogged = (entry: QueueEntry, logged: Logged) => void;

export interface LogQueue {
  readonly person: { readonly id: string; readonly name: string };
  readonly entries: readonly QueueEntry[];
  readonly link: LinkState;
  /** False when the browser keeps nothing: closing the page would lose what waits. */
  readonly isKept: boolean;
  readonly add: (night: { readonly id: string; readonly name: string }, outgoing: Outgoing) => void;
  readonly discard: (key: string) => void;
  readonly sendNow: () => void;
  /** Calls back for each entry that the server has taken; returns the end of it. */
  readonly follow: (onLogged: OnLogged) => () => void;
}

const Context = createContext<LogQueue | null>(null);

export function useLogQueue(): LogQueue {
  const queue = useContext(Context);
  if (queue === null) throw new Error('The log’s queue is missing: the page lies outside the log.');
  return queue;
}

/** Sends whenever there is something to send and a link to send it over; after a failure again, less and less often. */
function useSender(person: string, waiting: number, onLogged: OnLogged) {
  const [link, setLink] = useState<LinkState>('idle');
  const isBusy = useRef(false);
  const failures = useRef(0);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const latest = useRef<() => void>(() => undefined);
  const send = useCallback(async () => {
    clearTimeout(timer.current);
    if (isBusy.current) return;
    isBusy.current = true;
    setLink('sending');
    const end = await drainQueue({ person, onLogged }).finally(() => {
      isBusy.current = false;
    });
    failures.current = end.kind === 'unreachable' ? failures.current + 1 : 0;
    setLink(end.kind === 'unreachable' || end.kind === 'signed-out' ? end.kind : 'idle');
    if (end.kind === 'empty') return;
    const wait_s = end.kind === 'unreachable' ? (end.retryAfter_s ?? pause_s(failures.current)) : 15;
    timer.current = setTimeout(() => latest.current(), wait_s * 1000);
  }, [person, onLogged]);
  useEffect(() => {
    latest.current = () => void send();
  });
  useEffect(() => {
    if (waiting > 0) latest.current();
  }, [waiting]);
  useEffect(() => {
    const go = () => latest.current();
    window.addEventListener('online', go);
    return () => {
      window.removeEventListener('online', go);
      clearTimeout(timer.current);
    };
  }, []);
  return { link, sendNow: useCallback(() => latest.current(), []) };
}

function useFollowers() {
  const followers = useRef(new Set<OnLogged>());
  const tell = useCallback<OnLogged>((entry, logged) => {
    for (const follower of followers.current) follower(entry, logged);
  }, []);
  const follow = useCallback((follower: OnLogged) => {
    followers.current.add(follower);
    return () => void followers.current.delete(follower);
  }, []);
  return { tell, follow };
}

/** Warns before a page is closed that alone holds what waits. */
function useLeaveWarning(isAtRisk: boolean): void {
  useEffect(() => {
    if (!isAtRisk) return;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [isAtRisk]);
}

interface LogQueueProviderProps {
  readonly person: { readonly id: string; readonly name: string };
  readonly children: ReactNode;
}

/** Keeps and sends the entries of every log page: one queue for the whole side of the observer. */
export function LogQueueProvider({ person, children }: LogQueueProviderProps) {
  const { id, name } = person;
  const entries = useSyncExternalStore(followQueue, readQueue, emptyQueue);
  const waiting = entries.filter((entry) => entry.person === id && entry.refused === null).length;
  const { tell, follow } = useFollowers();
  const { link, sendNow } = useSender(id, waiting, tell);
  const isKept = isQueueKept();
  useLeaveWarning(waiting > 0 && !isKept);
  const queue = useMemo<LogQueue>(
    () => ({
      person: { id, name },
      entries,
      link,
      isKept,
      add: (night, outgoing) =>
        changeQueue((present) => [
          ...present,
          {
            key: newKey(),
            person: id,
            personName: name,
            night: night.id,
            nightName: night.name,
            madeAt: new Date().toISOString(),
            outgoing,
            refused: null,
          },
        ]),
      discard: (key) => changeQueue((present) => present.filter((entry) => entry.key !== key)),
      sendNow,
      follow,
    }),
    [id, name, entries, link, isKept, sendNow, follow],
  );
  return <Context value={queue}>{children}</Context>;
}
