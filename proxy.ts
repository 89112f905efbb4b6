import { NextResponse, type NextRequest } from 'next/server';

/** The largest request body, in bytes, that any address outside `UPLOAD_ADDRESSES` takes. */
export const LARGEST_BODY_BYTES = 1_048_576;

/** Addresses that take files and check the size of what they get themselves. None yet. */
const UPLOAD_ADDRESSES: readonly RegExp[] = [];

/** Pages a visitor sees without being signed in. The API answers for itself, with a status code. */
const OPEN_ADDRESSES =
  /^\/(sign-in|sign-out|forgotten-password|reset|invitation|setup|caught-mail|health|api)(\/|$)/;

/** Answers that carry their own, narrower content security policy (a caught mail shown in a frame). */
const OWN_POLICY_ADDRESSES = /^\/caught-mail\/[^/]+\/html$/;

const SESSION_COOKIE = /^(__Secure-|__Host-)?(next-auth|stepwell)\.session-token(\.\d+)?$/;
const BODY_METHODS = new Set(['POST', 'PUT', 'PATCH', 'DELETE']);

/**
 * The content security policy of a page.
 * @param nonce the value Next.js puts on the scripts and styles of this one answer
 * @param development true while the development server runs: React's error overlay needs eval, and hot
 *   replacement a web socket and injected styles; a production answer never allows any of these
 */
export function contentSecurityPolicy(nonce: string, development: boolean): string {
  return [
    `default-src 'self'`,
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development ? ` 'unsafe-eval'` : ''}`,
    development ? `style-src 'self' 'unsafe-inline'` : `style-src 'self' 'nonce-${nonce}'`,
    `img-src 'self' data: blob:`,
    `font-src 'self'`,
    `connect-src 'self'${development ? ' ws:' : ''}`,
    `worker-src 'self'`,
    `manifest-src 'self'`,
    `object-src 'none'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-src 'self'`,
    `frame-ancestors 'none'`,
  ].join('; ');
}

function refusal(status: number, title: string, detail: string): NextResponse {
  return new NextResponse(JSON.stringify({ type: 'about:blank', title, status, detail }), {
    status,
    headers: { 'content-type': 'application/problem+json', 'cache-control': 'no-store' },
  });
}

/** Refuses a body that is over-large, or of a length nobody knows; null when the request may go on. */
function refuseBody(request: NextRequest): NextResponse | null {
  if (!BODY_METHODS.has(request.method)) return null;
  if (UPLOAD_ADDRESSES.some((address) => address.test(request.nextUrl.pathname))) return null;
  const length = request.headers.get('content-length');
  if (length === null) {
    if (request.headers.get('transfer-encoding') === null) return null;
    return refusal(
      411,
      'Length required',
      'Send the length of the body (Content-Length) with this request. Nothing was recorded.',
    );
  }
  if (Number(length) <= LARGEST_BODY_BYTES) return null;
  return refusal(
    413,
    'Content too large',
    `This request holds ${length} bytes; at most ${LARGEST_BODY_BYTES} are taken here. Nothing was recorded.`,
  );
}

/** Sends a visitor without a session cookie to the sign-in page. It is no authorisation: every page and act asks again. */
function redirectSignedOut(request: NextRequest): NextResponse | null {
  if (request.method !== 'GET' && request.method !== 'HEAD') return null;
  const { pathname, search } = request.nextUrl;
  if (OPEN_ADDRESSES.test(pathname)) return null;
  if (request.cookies.getAll().some(({ name }) => SESSION_COOKIE.test(name))) return null;
  const target = new URL('/sign-in', request.url);
  if (pathname !== '/') target.searchParams.set('next', pathname + search);
  return NextResponse.redirect(target);
}

/**
 * Runs before every page, action and route: refuses over-large bodies, sends signed-out visitors to the
 * sign-in page, and sets the content security policy with a nonce made for this one answer.
 */
export function proxy(request: NextRequest): NextResponse {
  const early = refuseBody(request) ?? redirectSignedOut(request);
  if (early) return early;

  // The bundler replaces NODE_ENV by a constant: it is no configuration of the installation.
  // eslint-disable-next-line no-restricted-properties
  const development = process.env.NODE_ENV === 'development';
  const nonce = btoa(crypto.randomUUID());
  const policy = contentSecurityPolicy(nonce, development);

  const headers = new Headers(request.headers);
  headers.set('content-security-policy', policy);
  headers.set('x-nonce', nonce);
  // Where a page sends a visitor back to whose session has ended meanwhile.
  headers.set('x-stepwell-address', request.nextUrl.pathname + request.nextUrl.search);
  const response = NextResponse.next({ request: { headers } });
  if (!OWN_POLICY_ADDRESSES.test(request.nextUrl.pathname)) {
    response.headers.set('content-security-policy', policy);
  }
  if (isEncrypted(request)) {
    response.headers.set('strict-transport-security', 'max-age=31536000; includeSubDomains');
  }
  return response;
}

function isEncrypted(request: NextRequest): boolean {
  return (
    request.nextUrl.protocol === 'https:' ||
    request.headers.get('x-forwarded-proto')?.split(',')[0]?.trim() === 'https'
  );
}

export const config = {
  matcher: ['/((?!_next/static|_next/image|favicon.ico|icon.svg|licences/).*)'],
};
