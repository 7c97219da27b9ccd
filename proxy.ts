import { NextResponse, type NextRequest } from 'next/server';
import { apiHeaders, newNonce, pageHeaders } from '@/lib/http/page-headers';

/** Puts security headers on every answer. Who may do what is never decided here: each route and page asks itself. */
export function proxy(request: NextRequest): NextResponse {
  if (request.nextUrl.pathname.startsWith('/api/')) {
    const answer = NextResponse.next();
    for (const [name, value] of Object.entries(apiHeaders())) answer.headers.set(name, value);
    return answer;
  }
  const nonce = newNonce();
  const headers = pageHeaders(nonce);
  const forwarded = new Headers(request.headers);
  forwarded.set('x-nonce', nonce);
  // The way back after signing in; what a caller sent under this name is overwritten.
  forwarded.set('x-firstpull-path', request.nextUrl.pathname + request.nextUrl.search);
  // The renderer reads the nonce from the request's policy and puts it on its own scripts.
  forwarded.set('content-security-policy', headers['content-security-policy']);
  const answer = NextResponse.next({ request: { headers: forwarded } });
  for (const [name, value] of Object.entries(headers)) answer.headers.set(name, value);
  return answer;
}

export const config = { matcher: ['/((?!_next/static/|_next/image).*)'] };
