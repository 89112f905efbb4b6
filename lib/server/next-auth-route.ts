import 'server-only';
import NextAuth from 'next-auth';
import type { NextRequest } from 'next/server';
import { RefusedError } from '@/lib/errors';
import { authOptions } from './auth-options';
import { hidden } from './hidden';
import { problemOf } from './problem';

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
    refuseCallbackAddress(request, options.cookies?.callbackUrl?.name ?? '');
    await refuseUnreadableBody(request);
    const handle = NextAuth(options) as (request: NextRequest, context: Context) => Promise<Response>;
    return await handle(request, context);
  } catch (error) {
    return problemOf(request, error, null);
  }
}

function refuseCallbackAddress(request: NextRequest, cookieName: string): void {
  const given = [request.nextUrl.searchParams.get('callbackUrl'), request.cookies.get(cookieName)?.value];
  for (const address of given) {
    if (address && !isHttpAddress(address)) {
      throw new RefusedError({
        code: 'invalid',
        message: 'The address to go to after signing in is not one.',
      });
    }
  }
}

function isHttpAddress(text: string): boolean {
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
