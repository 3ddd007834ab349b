import 'server-only';
import type { MeasurementSet } from '@/lib/contracts/api/measurement-set';
import type { SetPage, SetPart, SetPartContents } from '@/lib/contracts/set-page';
import type { Caller } from '@/lib/server/policy/caller';
import {
  measuredStars,
  measurementFaults,
  measurementRows,
  measurementSummary,
} from './measurement-contents';
import { measurementSet, visibleSet } from './measurement-sets';

export interface SetPageQuery {
  readonly part?: SetPart | undefined;
  readonly after?: string | undefined;
  readonly reason?: string | undefined;
}

const limit = 100;

/** All that the page of a set shows. */
export async function setPage(caller: Caller, id: string, query: SetPageQuery): Promise<SetPage> {
  const [set, { set: row }] = await Promise.all([measurementSet(caller, id), visibleSet(caller, id)]);
  const [summary, contents] = await Promise.all([
    measurementSummary(caller, id),
    contentsOf(caller, set, query),
  ]);
  return { set, telescopeName: row.telescopeName, summary, contents, after: query.after ?? null };
}

/** The part that is shown when none is asked for: what a person most likely came for. */
function usualPart(set: MeasurementSet): SetPart {
  if (set.kind === 'target') return 'rows';
  return (set.matched_rows ?? 1) > 0 ? 'matched' : 'others';
}

async function contentsOf(
  caller: Caller,
  set: MeasurementSet,
  { part = usualPart(set), after, reason }: SetPageQuery,
): Promise<SetPartContents | null> {
  const page = { limit, ...(after === undefined ? {} : { after }) };
  if (set.state === 'refused') {
    return set.is_whole ? { part: 'faults', list: await measurementFaults(caller, set.id, page) } : null;
  }
  if (set.state !== 'matched' && set.state !== 'in use') return null;
  if (part === 'rows' || part === 'faults') {
    return { part: 'rows', list: await measurementRows(caller, set.id, page) };
  }
  const matched = part === 'matched' ? 'yes' : 'no';
  const list = await measuredStars(caller, set.id, { ...page, matched, reason });
  return { part, list, reason: reason ?? null };
}
