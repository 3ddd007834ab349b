import 'server-only';
import type { NextFrame } from '@/lib/contracts/api/frame';
import { proposeFrame } from '@/lib/contracts/propose-frame';
import { highestFrameNumber } from '@/lib/server/data/frame-writes';
import { latestFrames } from '@/lib/server/data/frames';
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
  const former = frames.map(({ decl: dec, ...frame }) => ({ ...frame, dec }));
  return proposeFrame(former, instrument.filters, highest);
}
