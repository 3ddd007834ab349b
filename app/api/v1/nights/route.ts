import { listNights, openNight } from '@/lib/contracts/api/night';
import { openNight as open } from '@/lib/server/acts/open-night';
import { endpoint } from '@/lib/server/http/endpoint';
import { listNights as list } from '@/lib/server/reads/list-nights';

export const GET = endpoint(listNights, ({ caller, query }) => list(caller, query));

export const POST = endpoint(openNight, ({ caller, body }) => open(caller, body));
