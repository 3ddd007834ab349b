import { listFrames, logFrames } from '@/lib/contracts/api/frame';
import { logFrames as log } from '@/lib/server/acts/log-frames';
import { endpoint } from '@/lib/server/http/endpoint';
import { nightFrames } from '@/lib/server/reads/night-frames';

export const GET = endpoint(listFrames, ({ caller, params, query }) => nightFrames(caller, params.id, query));

export const POST = endpoint(logFrames, async ({ caller, params, body }) => {
  const isList = Array.isArray(body);
  const origin = caller.via === 'token' ? 'api' : 'log';
  const frames = await log(caller, params.id, isList ? body : [body], { origin, isList });
  const [first] = frames;
  return isList || !first ? { items: frames, next: null } : first;
});
