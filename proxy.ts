import { NextResponse, type NextRequest } from 'next/server';
import { pathHeader } from './lib/contracts/path-header';

/** Tells pages which address they are rendered for, so that sign-in can lead back there. */
export function proxy(request: NextRequest): NextResponse {
  const headers = new Headers(request.headers);
  const search = new URLSearchParams(request.nextUrl.search);
  search.delete('_rsc');
  const query = search.size > 0 ? `?${search.toString()}` : '';
  headers.set(pathHeader, `${request.nextUrl.pathname}${query}`);
  return NextResponse.next({ request: { headers } });
}

// Pages only. A request that passes here has its body cut at 10 MB, without an error: uploads under /api must not.
export const config = { matcher: ['/((?!api/|_next/|favicon\\.ico).*)'] };
