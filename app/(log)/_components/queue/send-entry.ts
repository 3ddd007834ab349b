import { callApi, type ApiResult } from '@/app/_components/hooks/call-api';
import { addConditions, type Condition } from '@/lib/contracts/api/condition';
import { logFrames, type Frame } from '@/lib/contracts/api/frame';
import { addRemark, type Remark } from '@/lib/contracts/api/remark';
import { addTimeLoss, type TimeLoss } from '@/lib/contracts/api/time-loss';
import type { QueueEntry } from './queue-entry';

/** What the server made of an entry. */
export type Logged =
  | { readonly kind: 'frame'; readonly value: Frame }
  | { readonly kind: 'condition'; readonly value: Condition }
  | { readonly kind: 'remark'; readonly value: Remark }
  | { readonly kind: 'time-loss'; readonly value: TimeLoss };

/** One entry is answered by the thing itself, not by a list. */
function as<K extends Logged['kind']>(
  kind: K,
  result: ApiResult<unknown>,
): ApiResult<Extract<Logged, { readonly kind: K }>> {
  if (!result.ok) return result;
  return { ok: true, value: { kind, value: result.value } as Extract<Logged, { readonly kind: K }> };
}

/** Sends one entry under its key. */
export async function sendEntry({ key, night, outgoing }: QueueEntry): Promise<ApiResult<Logged>> {
  const params = { id: night };
  switch (outgoing.kind) {
    case 'frame':
      return as('frame', await callApi(logFrames, { params, key, body: outgoing.body }));
    case 'condition':
      return as('condition', await callApi(addConditions, { params, key, body: outgoing.body }));
    case 'remark':
      return as('remark', await callApi(addRemark, { params, key, body: outgoing.body }));
    case 'time-loss':
      return as('time-loss', await callApi(addTimeLoss, { params, key, body: outgoing.body }));
  }
}
