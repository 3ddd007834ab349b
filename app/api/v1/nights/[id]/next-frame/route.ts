import { getNextFrame } from '@/lib/contracts/api/frame';
import { endpoint } from '@/lib/server/http/endpoint';
import { nextFrame } from '@/lib/server/reads/next-frame';

export const GET = endpoint(getNextFrame, ({ caller, params }) => nextFrame(caller, params.id));
