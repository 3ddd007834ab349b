import { getHealth } from '@/lib/contracts/api/health';
import { endpoint } from '@/lib/server/http/endpoint';
import { health } from '@/lib/server/reads/health';

export const GET = endpoint(getHealth, () => health());
