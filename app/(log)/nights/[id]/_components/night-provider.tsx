'use client';

import { createContext, useCallback, useContext, useEffect, useMemo, useState, type ReactNode } from 'react';
import type { NightSky } from '@/app/_components/charts/night-band/night-sky';
import { callApi } from '@/app/_components/hooks/call-api';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { getNight } from '@/lib/contracts/api/night';
import type { ObjectName } from '@/lib/contracts/api/object-name';
import type { NightLog } from '@/lib/contracts/night-log';
import { useLogQueue } from '../../../_components/queue/log-queue';
import type { Outgoing, QueueEntry } from '../../../_components/queue/queue-entry';
import type { Logged } from '../../../_components/queue/send-entry';
import { fetchNight } from './fetch-night';
import { isBehind, withItem } from './night-log';
import { useNightSky } from './use-night-sky';

interface NightContext {
  readonly log: NightLog;
  readonly sky: NightSky;
  /** Names that a frame's object can have. */
  readonly objects: readonly ObjectName[];
  /** People who can be the night's observers. */
  readonly observers: readonly { readonly id: string; readonly name: string }[];
  /** Entries for this night that are not with the server, of whoever is signed in. */
  readonly waiting: readonly QueueEntry[];
  /** The server's clock when it made the page, ms. */
  readonly serverNow: number;
  /** Puts an entry on its way. */
  readonly send: (outgoing: Outgoing) => void;
  /** Takes over what the server answered to a change. */
  readonly change: (change: (log: NightLog) => NightLog) => void;
  /** Takes over what the server has now. */
  readonly reload: () => Promise<void>;
}

const Context = createContext<NightContext | null>(null);

export function useNight(): NightContext {
  const night = useContext(Context);
  if (night === null) throw new Error('There is no night around this part of the page.');
  return night;
}

function withLogged(log: NightLog, logged: Logged): NightLog {
  switch (logged.kind) {
    case 'frame':
      return { ...log, frames: withItem(log.frames, logged.value) };
    case 'condition':
      return { ...log, conditions: withItem(log.conditions, logged.value) };
    case 'remark':
      return { ...log, remarks: withItem(log.remarks, logged.value) };
    case 'time-loss':
      return { ...log, timeLosses: withItem(log.timeLosses, logged.value) };
  }
}

/** The server's page as it came, then with what was logged since; a newer page of the server's replaces it. */
function useLog(made: NightLog): readonly [NightLog, (change: (log: NightLog) => NightLog) => void] {
  const [basis, setBasis] = useState(made);
  const [log, setLog] = useState(made);
  if (basis !== made) {
    setBasis(made);
    setLog(made);
  }
  return [log, setLog];
}

const look_ms = 60_000;

/** Looks once a minute, while somebody looks at the page, whether others have logged something. */
function useOthers(log: NightLog, isBusy: boolean, reload: () => Promise<void>): void {
  useEffect(() => {
    if (log.night.state !== 'open' || isBusy) return;
    const timer = setInterval(() => {
      if (document.hidden) return;
      void callApi(getNight, { params: { id: log.night.id } }).then((result) =>
        result.ok && isBehind(log, result.value) ? reload() : undefined,
      );
    }, look_ms);
    return () => clearInterval(timer);
  }, [log, isBusy, reload]);
}

interface NightProviderProps {
  readonly made: NightLog;
  readonly sky: NightSky;
  readonly objects: readonly ObjectName[];
  readonly observers: NightContext['observers'];
  readonly serverNow: number;
  readonly children: ReactNode;
}

/** One night for all parts of its pages: head, band, tabs and tables show the same, and change together. */
export function NightProvider({
  made,
  sky: madeSky,
  objects,
  observers,
  serverNow,
  children,
}: NightProviderProps) {
  const [log, change] = useLog(made);
  const { entries, person, add, follow } = useLogQueue();
  const { id, date, telescope } = log.night;
  const waiting = useMemo(
    () => entries.filter((entry) => entry.night === id && entry.person === person.id),
    [entries, id, person.id],
  );
  useEffect(
    () =>
      follow((entry, logged) => {
        if (entry.night === id) change((present) => withLogged(present, logged));
      }),
    [follow, id, change],
  );
  const sky = useNightSky(log, madeSky);
  const reload = useCallback(async () => {
    const fresh = await fetchNight(log);
    if (fresh !== null) change(() => fresh);
  }, [log, change]);
  useOthers(log, waiting.length > 0, reload);
  const send = useCallback(
    (outgoing: Outgoing) => add({ id, name: `${formatDateInWords(date)}, ${telescope}` }, outgoing),
    [add, id, date, telescope],
  );
  const night = useMemo<NightContext>(
    () => ({ log, sky, objects, observers, waiting, serverNow, send, change, reload }),
    [log, sky, objects, observers, waiting, serverNow, send, change, reload],
  );
  return <Context value={night}>{children}</Context>;
}
