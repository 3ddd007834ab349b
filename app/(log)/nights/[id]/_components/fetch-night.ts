import { callApi, type ApiResult } from '@/app/_components/hooks/call-api';
import { listConditions } from '@/lib/contracts/api/condition';
import { listFrames } from '@/lib/contracts/api/frame';
import { getNight } from '@/lib/contracts/api/night';
import { listRemarks } from '@/lib/contracts/api/remark';
import { listTimeLosses } from '@/lib/contracts/api/time-loss';
import type { NightLog } from '@/lib/contracts/night-log';
import { mayIn } from './night-log';

interface Listed<T> {
  readonly items: readonly T[];
  readonly next: string | null;
}

/** All pages of a list; null as soon as one does not come. */
async function all<T>(
  page: (query: Record<string, string>) => Promise<ApiResult<Listed<T>>>,
): Promise<readonly T[] | null> {
  const items: T[] = [];
  let after: string | null = null;
  do {
    const result: ApiResult<Listed<T>> = await page({ limit: '1000', ...(after === null ? {} : { after }) });
    if (!result.ok) return null;
    items.push(...result.value.items);
    after = result.value.next;
  } while (after !== null);
  return items;
}

/**
 * The night as the server has it now, or null when it cannot be had. By the interface and not by making the page anew:
 * a page that is being made anew over a dead link is gone, and with it the observer's place to work.
 */
export async function fetchNight(log: NightLog): Promise<NightLog | null> {
  const params = { id: log.night.id };
  const [night, frames, conditions, remarks, losses] = await Promise.all([
    callApi(getNight, { params }),
    all((query) => callApi(listFrames, { params, query })),
    all((query) => callApi(listConditions, { params, query })),
    all((query) => callApi(listRemarks, { params, query })),
    callApi(listTimeLosses, { params }),
  ]);
  if (!night.ok || !losses.ok || frames === null || conditions === null || remarks === null) return null;
  const may = mayIn(log.may, night.value.state);
  return { ...log, night: night.value, frames, conditions, remarks, timeLosses: losses.value.items, may };
}
