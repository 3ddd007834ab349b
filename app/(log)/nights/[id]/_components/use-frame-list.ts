'use client';

import { useDeferredValue, useMemo, useState } from 'react';
import { callApi, newKey } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { logFrames, maxFramesPerCall, type Frame } from '@/lib/contracts/api/frame';
import { checkFrames, serverFaults } from './check-frames';
import { printFrameList, readFrameList } from './frame-list';
import { headerLine } from './header-line';
import { withItem } from './night-log';
import { useNight } from './night-provider';
import { readHeaders } from './read-headers';

/** The text outlives the dialogue and a reload, in this tab. */
const placeOf = (night: string) => `evenfall.frame-list.${night}`;

function useKeptText(night: string) {
  const [text, setText] = useState(() => sessionStorage.getItem(placeOf(night)) ?? '');
  const keep = (next: string) => {
    setText(next);
    try {
      sessionStorage.setItem(placeOf(night), next);
    } catch {
      // Too long for the browser's storage: then it lives as long as the page.
    }
  };
  return [text, keep] as const;
}

/** FITS files to lines of the list, in the order of their starts, numbered on from the log. */
function useHeaders(text: string, keep: (text: string) => void) {
  const { log, objects } = useNight();
  const [progress, setProgress] = useState<{ readonly done: number; readonly of: number } | null>(null);
  const [unread, setUnread] = useState<readonly string[]>([]);
  const take = async (files: readonly File[]) => {
    setProgress({ done: 0, of: files.length });
    const headers = await readHeaders(files, (done) => setProgress({ done, of: files.length }));
    setProgress(null);
    setUnread(headers.flatMap((header) => (header.ok ? [] : [`${header.file} ${header.reason}`])));
    const context = { filters: log.telescope.filters, objects };
    const lines = headers.flatMap((header) =>
      header.ok ? [headerLine(header.values, header.file, context)] : [],
    );
    const listed = readFrameList(text).lines.map(({ line }) => line);
    const taken = [...log.frames.map(({ number }) => number), ...listed.map(({ number }) => Number(number))];
    let next = taken.reduce((most, number) => Math.max(most, number || 0), 0);
    const numbered = lines
      .toSorted((a, b) => a.start.localeCompare(b.start))
      .map((line) => ({ ...line, number: String((next += 1)) }));
    if (numbered.length > 0) keep(printFrameList([...listed, ...numbered]));
  };
  return { take, progress, unread };
}

/** A list of frames: its text, what each line of it says, and logging all of it or nothing. */
export function useFrameList(onClose: () => void) {
  const { log, change } = useNight();
  const [text, keep] = useKeptText(log.night.id);
  const headers = useHeaders(text, keep);
  const { isBusy, refusal, run, clear } = useApiCall();
  const [key, setKey] = useState(newKey);
  const deferred = useDeferredValue(text);
  const { lines, problems } = useMemo(() => readFrameList(deferred), [deferred]);
  const checked = useMemo(
    () => checkFrames(lines, { night: log.night, telescope: log.telescope, frames: log.frames }),
    [lines, log.night, log.telescope, log.frames],
  );
  const good = checked.flatMap(({ input }) => input ?? []);
  const wrong = checked.length - good.length;
  const type = (next: string) => {
    keep(next);
    setKey(newKey());
    clear();
  };
  const logAll = async () => {
    const params = { id: log.night.id };
    const done = await run(callApi(logFrames, { params, key, body: good }));
    if (done === null) return;
    const frames: readonly Frame[] = 'items' in done.value ? done.value.items : [done.value];
    change((present) => ({ ...present, frames: frames.reduce(withItem, present.frames) }));
    type('');
    onClose();
  };
  const fault = refusal && { ...refusal, issues: serverFaults(refusal.issues, lines) };
  const isTooMany = checked.length > maxFramesPerCall;
  const canLog = good.length > 0 && wrong === 0 && !isTooMany && deferred === text;
  return { text, type, headers, checked, problems, good, wrong, isBusy, fault, isTooMany, canLog, logAll };
}
