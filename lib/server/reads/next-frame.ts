import 'server-only';
import type { NextFrame } from '@/lib/contracts/api/frame';
import type { Band } from '@/lib/contracts/bands';
import { highestFrameNumber } from '@/lib/server/data/frame-writes';
import { latestFrames, type FrameRow } from '@/lib/server/data/frames';
import { instrumentOf } from '@/lib/server/data/instruments';
import { requireNight } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { nightScope } from '@/lib/server/policy/scope';

/** Enough to see the sequence of bands, which repeats after a handful of frames. */
const remembered = 50;

/** What the next frame of a night probably is: the last one again, in the band that follows in the sequence. */
export async function nextFrame(caller: Caller, id: string): Promise<NextFrame> {
  const scope = nightScope(caller);
  const night = await requireNight(scope, id);
  const [instrument, frames, highest] = await Promise.all([
    instrumentOf(night),
    latestFrames(scope, night.id, remembered),
    highestFrameNumber(null, night.id),
  ]);
  const [last] = frames;
  if (!last) {
    return {
      number: highest + 1,
      type: 'bias',
      object: '',
      field: null,
      programme: null,
      ra: null,
      dec: null,
      band: null,
      exposure: 0,
    };
  }
  const alike = frames.filter(({ object, type }) => object === last.object && type === last.type);
  const band = bandAfter(alike);
  const before = alike.find((frame) => frame.band === band);
  const usual = instrument.filters.find((filter) => filter.band === band)?.defaultExposure ?? null;
  return {
    number: highest + 1,
    type: last.type,
    object: last.object,
    field: last.field,
    programme: last.programme,
    ra: last.ra,
    dec: last.decl,
    band,
    exposure: before?.exposure ?? usual,
  };
}

/** The band that came after the last one, when it was last used before; frames come the latest first. */
function bandAfter(frames: readonly FrameRow[]): Band | null {
  const bands = frames.map(({ band }) => band);
  const [last = null] = bands;
  const earlier = bands.indexOf(last, 1);
  return earlier > 0 ? (bands[earlier - 1] ?? null) : last;
}
