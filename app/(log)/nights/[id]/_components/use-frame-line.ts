'use client';

import { useState } from 'react';
import type { Frame, FrameInput } from '@/lib/contracts/api/frame';
import type { ObjectName } from '@/lib/contracts/api/object-name';
import { bands, frameTypes } from '@/lib/contracts/bands';
import { proposeFrame, usualExposure, type FormerFrame } from '@/lib/contracts/propose-frame';
import { formatClock } from '@/app/_components/ui/format-time';
import {
  lineOf,
  proposedLine,
  readLine,
  wordOf,
  type FrameLine,
  type LineFaults,
  type LineField,
} from './frame-line';
import type { NightLog } from '@/lib/contracts/night-log';
import { latestFirst } from './night-log';

/**
 * By number, which is the order of logging: frames whose starts were typed after the fact may overlap, and their middles
 * would turn the sequence of bands about.
 */
const lastLoggedFirst = (frames: readonly Frame[]): readonly Frame[] =>
  [...frames].sort((a, b) => b.number - a.number);

/** What was logged before, the latest first: with the server, and after it what still waits. */
export function formerFrames(
  frames: readonly Frame[],
  waiting: readonly FrameInput[],
): readonly FormerFrame[] {
  const onItsWay = waiting.map((input): FormerFrame => ({
    number: input.number ?? 0,
    type: input.type,
    object: input.object,
    field: input.field ?? null,
    programme: input.programme ?? null,
    ra: input.ra ?? null,
    dec: input.dec ?? null,
    band: input.band ?? null,
    exposure: input.exposure,
  }));
  return [...onItsWay.toReversed(), ...lastLoggedFirst(frames)];
}

/** When the last frame ended, for nights that are over: `23:44:05`; the beginning of the night without one. */
function endOfLast(
  frames: readonly Frame[],
  waiting: readonly FrameInput[],
  night: NightLog['night'],
): string {
  const last = waiting.at(-1) ?? latestFirst(frames)[0];
  const end =
    last === undefined ? Date.parse(night.starts_at) : Date.parse(last.utc_start) + last.exposure * 1000;
  return formatClock(end);
}

interface LineInput {
  readonly log: NightLog;
  readonly objects: readonly ObjectName[];
  readonly waiting: readonly FrameInput[];
  /** ms */
  readonly now: number;
}

/** The state of the line: what it proposes, what was typed over it, what is wrong. */
export function useFrameLine({ log, objects, waiting, now }: LineInput) {
  const { night, telescope, frames } = log;
  const former = formerFrames(frames, waiting);
  const isNow = now >= Date.parse(night.starts_at) && now < Date.parse(night.ends_at);
  const highest = former.reduce((most, { number }) => Math.max(most, number), 0);
  const propose = (): FrameLine => ({
    ...proposedLine(proposeFrame(former, telescope.filters, highest)),
    start: isNow ? '' : endOfLast(frames, waiting, night),
  });
  /** Null as long as nobody typed: then the line follows what is proposed. */
  const [typed, setTyped] = useState<FrameLine | null>(null);
  const [touched, setTouched] = useState<ReadonlySet<LineField>>(new Set());
  const [faults, setFaults] = useState<LineFaults>({});
  const line = typed ?? propose();

  const exposureFor = (next: FrameLine): string => {
    const type = wordOf(frameTypes, next.type);
    if (type === null || touched.has('exposure')) return next.exposure;
    const wanted = { type, object: next.object.trim(), band: wordOf(bands, next.band) };
    const usual = usualExposure(former, telescope.filters, wanted);
    return usual === null ? next.exposure : String(usual);
  };
  /** A name that is known says what kind of frame it is, unless somebody has said so already. */
  const typeFor = (name: string): Partial<FrameLine> => {
    const known = objects.find((one) => one.name === name);
    if (known === undefined || touched.has('type')) return {};
    return { type: known.kind === 'target' ? 'target' : 'standard' };
  };
  const set = (field: LineField, value: string) => {
    const next = { ...line, [field]: value, ...(field === 'object' ? typeFor(value) : {}) };
    setTouched((fields) => new Set([...fields, field]));
    setTyped(['type', 'object', 'band'].includes(field) ? { ...next, exposure: exposureFor(next) } : next);
    setFaults(({ [field]: _mended, ...others }) => others);
  };
  const fill = (next: FrameLine, found: LineFaults = {}) => {
    setTyped(next);
    setTouched(new Set());
    setFaults(found);
  };
  const reset = () => {
    setTyped(null);
    setTouched(new Set());
    setFaults({});
  };
  /** The frame, if the line is one; else the faults come up beside their fields. */
  const read = (): FrameInput | null => {
    const result = readLine(line, { night, telescope, now: Date.now() });
    setFaults(result.ok ? {} : result.faults);
    return result.ok ? result.input : null;
  };
  const repeatLast = () => {
    const [last] = lastLoggedFirst(frames);
    const again = waiting.at(-1) ?? last;
    if (again === undefined) return;
    fill({ ...lineOf(again), number: String(highest + 1), start: propose().start, comment: '', file: '' });
  };
  const isUntouched = typed === null;
  return {
    line,
    isUntouched,
    faults,
    isNow,
    set,
    fill,
    reset,
    read,
    repeatLast,
    hasFormer: former.length > 0,
  };
}
