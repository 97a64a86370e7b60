import { type NextRequest, NextResponse } from 'next/server';
import { contentSecurityPolicy, newNonce, pageHeaders } from '@/http/securityHeaders';

/**
 * Runs before each page and only there: it gives the page its nonce and its headers. Next reads the nonce from the
 * policy on the request, our own code from `x-nonce`; `x-stillfield-path` is where a page sends the reader back to after
 * signing in. Who may see a page is decided by the services it calls.
 */
export function proxy(request: NextRequest): NextResponse {
  const nonce = newNonce();
  const policy = contentSecurityPolicy(nonce, process.env.NODE_ENV === 'development');
  const headers = new Headers(request.headers);
  headers.set('x-nonce', nonce);
  headers.set('content-security-policy', policy);
  headers.set('x-stillfield-path', request.nextUrl.pathname + request.nextUrl.search);
  const response = NextResponse.next({ request: { headers } });
  for (const [name, value] of pageHeaders(policy)) response.headers.set(name, value);
  return response;
}

/** API routes stay out: a proxy would cut their bodies at 10 MB. So do static files. */
export const config = {
  matcher: ['/((?!api/|api$|_next/static/|_next/image|favicon.ico|robots.txt|icon).*)'],
};
