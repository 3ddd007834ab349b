import { getNight, patchNight } from '@/lib/contracts/api/night';
import { changeNight } from '@/lib/server/acts/change-night';
import { closeNight } from '@/lib/server/acts/close-night';
import { reopenNight } from '@/lib/server/acts/reopen-night';
import { endpoint } from '@/lib/server/http/endpoint';
import { night } from '@/lib/server/reads/night';

export const GET = endpoint(getNight, ({ caller, params }) => night(caller, params.id));

export const PATCH = endpoint(patchNight, ({ caller, params, body }) => {
  const { state, reason, ...rest } = body;
  if (state === 'closed') return closeNight(caller, params.id, rest);
  // The schema asks for a reason with “open”.
  if (state === 'open')
    return reopenNight(caller, params.id, { reason: reason ?? '', version: rest.version });
  return changeNight(caller, params.id, rest);
});
