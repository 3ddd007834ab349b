import 'server-only';
import type { Frame, FrameQuery } from '@/lib/contracts/api/frame';
import type { List } from '@/lib/contracts/common';
import { Fault } from '@/lib/faults/fault';
import { findFrame, listFrameRows, toFrame } from '@/lib/server/data/frames';
import { requireNight } from '@/lib/server/data/nights';
import type { Caller } from '@/lib/server/policy/caller';
import { nightScope } from '@/lib/server/policy/scope';

/** Frames of a night that the caller may see, by number. */
export async function nightFrames(caller: Caller, id: string, query: FrameQuery): Promise<List<Frame>> {
  const scope = nightScope(caller);
  const night = await requireNight(scope, id);
  const { rows, next } = await listFrameRows(scope, night.id, query);
  return { items: rows.map(toFrame), next };
}

/** One frame that the caller may see. */
export async function nightFrame(
  caller: Caller,
  ids: { readonly night: string; readonly frame: string },
): Promise<Frame> {
  const scope = nightScope(caller);
  const night = await requireNight(scope, ids.night);
  const row = await findFrame(scope, night.id, ids.frame);
  if (row) return toFrame(row);
  throw new Fault('not-found', 'There is no such frame in this night, or it is not yours to see.');
}
