import { getMe } from '@/lib/contracts/api/me';
import { endpoint } from '@/lib/server/http/endpoint';
import { readMe } from '@/lib/server/reads/me';

export const GET = endpoint(getMe, ({ caller }) => readMe(caller));
