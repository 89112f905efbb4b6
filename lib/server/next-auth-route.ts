import 'server-only';
import NextAuth from 'next-auth';
import type { NextRequest } from 'next/server';
import { RefusedError } from '@/lib/errors';
import { authOptions } from './auth-options';
import { hidden } from './hidden';
import { problemOf } from './problem';
import { isReachedOverHttps } from './session-cookie';

type Context = { params: Promise<{ nextauth: string[] }> };

/** The addresses of next-auth that are served, by method; its own pages are not among them. */
const SERVED: Readonly<Record<string, readonly string[]>> = {
  GET: ['csrf', 'providers', 'session', 'signin', 'signout', 'error'],
  POST: ['callback/credentials', 'signout'],
};

/**
 * next-auth's route. What it would answer with a fault of the server is refused before: a callback address that is
 * none, and a body that is no form. Its options are made at the request, since a build has no environment.
 */
export async function nextAuthRoute(request: NextRequest, context: Context): Promise<Response> {
  try {
    const { nextauth } = await context.params;
    if (!SERVED[request.method]?.includes(nextauth.join('/'))) throw hidden();
    const options = authOptions();
    const cookieName = options.cookies?.callbackUrl?.name ?? '';
    if (!isHttpAddress(request.cookies.get(cookieName)?.value)) return forgetCookie(request, cookieName);
    if (!isHttpAddress(request.nextUrl.searchParams.get('callbackUrl'))) throw NO_ADDRESS;
    await refuseUnreadableBody(request);
    const handle = NextAuth(options) as (request: NextRequest, context: Context) => Promise<Response>;
    return await handle(request, context);
  } catch (error) {
    return problemOf(request, error, null);
  }
}

const NO_ADDRESS = new RefusedError({
  code: 'invalid',
  message: 'The address to go to after signing in is not one. Load the page again.',
});

/** Takes back a cookie next-auth cannot read; the next try is without it. */
function forgetCookie(request: NextRequest, name: string): Response {
  const answer = problemOf(request, NO_ADDRESS, null);
  const secure = isReachedOverHttps() ? '; Secure' : '';
  answer.headers.append('set-cookie', `${name}=; Path=/; Max-Age=0; HttpOnly; SameSite=Lax${secure}`);
  return answer;
}

/** Whether a callback address is one, or is not given at all. */
function isHttpAddress(text: string | null | undefined): boolean {
  if (!text) return true;
  const base = text.startsWith('/') ? 'http://localhost' : undefined;
  return URL.canParse(text, base) && /^https?:$/.test(new URL(text, base).protocol);
}

async function refuseUnreadableBody(request: NextRequest): Promise<void> {
  if (request.method !== 'POST') return;
  const type = request.headers.get('content-type') ?? '';
  if (type.includes('application/x-www-form-urlencoded')) return;
  try {
    if (type.includes('application/json') && typeof (await request.clone().json()) === 'object') return;
  } catch {
    // Refused below, in words.
  }
  throw new RefusedError({ code: 'invalid', message: 'Address and password come as a form.' });
}
