import { correctFrame, getFrame, removeFrame } from '@/lib/contracts/api/frame';
import { correctFrame as correct } from '@/lib/server/acts/correct-frame';
import { removeFrame as remove } from '@/lib/server/acts/remove-frame';
import { endpoint } from '@/lib/server/http/endpoint';
import { nightFrame } from '@/lib/server/reads/night-frames';

export const GET = endpoint(getFrame, ({ caller, params }) =>
  nightFrame(caller, { night: params.id, frame: params.frame }),
);

export const PATCH = endpoint(correctFrame, ({ caller, params, body }) =>
  correct(caller, { night: params.id, frame: params.frame }, body),
);

export const DELETE = endpoint(removeFrame, async ({ caller, params, query }) => {
  await remove(caller, { night: params.id, frame: params.frame }, query.reason);
  return undefined;
});
