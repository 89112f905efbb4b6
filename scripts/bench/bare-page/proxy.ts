import { NextResponse, type NextRequest } from 'next/server';

/** The least that a policy with a nonce asks of every answer. */
export function proxy(request: NextRequest): NextResponse {
  const policy = `default-src 'self'; script-src 'self' 'nonce-${btoa(crypto.randomUUID())}' 'strict-dynamic'`;
  const headers = new Headers(request.headers);
  headers.set('content-security-policy', policy);
  const response = NextResponse.next({ request: { headers } });
  response.headers.set('content-security-policy', policy);
  return response;
}

export const config = { matcher: ['/((?!_next/static).*)'] };
