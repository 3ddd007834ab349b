import { createToken } from '@/lib/contracts/api/token';
import { makeTokenByPassword } from '@/lib/server/acts/make-token-by-password';
import { endpoint } from '@/lib/server/http/endpoint';
import { visitorFrom } from '@/lib/server/http/visitor';

export const POST = endpoint(createToken, ({ body, request, requestId }) =>
  makeTokenByPassword(visitorFrom(request.headers, requestId), body),
);
