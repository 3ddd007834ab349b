import { NextResponse, type NextRequest } from 'next/server';
import { pathHeader } from './lib/contracts/path-header';

/**
 * What a page may load: its own files, and of scripts only those that this answer names by its one-time number and
 * what they load in turn. Styles in attributes stay allowed: figures place their parts by them.
 */
function contentPolicy(nonce: string): string {
  // The development server compiles in the browser.
  const forDevelopment = process.env.NODE_ENV === 'development' ? " 'unsafe-eval'" : '';
  return [
    "default-src 'self'",
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${forDevelopment}`,
    `style-src 'self'${forDevelopment && " 'unsafe-inline'"}`,
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ].join('; ');
}

/** Tells pages which address they are rendered for, so that sign-in can lead back there, and what they may load. */
export function proxy(request: NextRequest): NextResponse {
  const headers = new Headers(request.headers);
  const search = new URLSearchParams(request.nextUrl.search);
  search.delete('_rsc');
  const query = search.size > 0 ? `?${search.toString()}` : '';
  headers.set(pathHeader, `${request.nextUrl.pathname}${query}`);
  const policy = contentPolicy(crypto.randomUUID());
  // Next takes the one-time number for its own scripts from the request's header.
  headers.set('content-security-policy', policy);
  const answer = NextResponse.next({ request: { headers } });
  answer.headers.set('content-security-policy', policy);
  return answer;
}

// Pages only. A request that passes here has its body cut at 10 MB, without an error: uploads under /api must not.
export const config = { matcher: ['/((?!api/|_next/|favicon\\.ico).*)'] };
