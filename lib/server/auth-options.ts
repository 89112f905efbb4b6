import 'server-only';
import type { NextAuthOptions } from 'next-auth';
import CredentialsProvider from 'next-auth/providers/credentials';
import { tokenDigest } from '@/lib/auth/tokens';
import { endSession } from '@/lib/commands/end-session';
import { proveIdentity } from '@/lib/commands/prove-identity';
import { startSession } from '@/lib/commands/start-session';
import { environment } from '@/lib/env';
import { RefusedError } from '@/lib/errors';
import { log } from '@/lib/log';
import { LONGEST_SESSION_MS } from '@/lib/policy/session-times';
import { signInSchema } from '@/lib/schemas/sign-in';
import { addressIn } from './client-address';
import { refusedInput } from './refused-input';
import { isReachedOverHttps, sessionCookieName, sessionSecret } from './session-cookie';
import { unexpected } from './unexpected';

/** Proves who signs in and begins a session. What it throws is shown on the sign-in page as it is. */
async function authorize(
  credentials: unknown,
  forwardedFor: string | null,
): Promise<{ id: string; session: string }> {
  try {
    const given = credentials as Readonly<Record<string, unknown>> | undefined;
    const parsed = signInSchema.safeParse({ email: given?.email, password: given?.password });
    if (!parsed.success) throw new RefusedError(refusedInput(parsed.error));
    const identity = await proveIdentity({
      ...parsed.data,
      purpose: 'sign-in',
      clientAddress: addressIn(forwardedFor),
    });
    return { id: identity.personId, session: await startSession(identity) };
  } catch (error) {
    if (error instanceof RefusedError) throw new Error(error.message);
    const { message, reference } = unexpected(error, { act: 'sign-in' });
    throw new Error(`${message} Reference ${reference}.`);
  }
}

function headerOf(headers: unknown, name: string): string | null {
  const value: unknown = (headers as Readonly<Record<string, unknown>> | undefined)?.[name];
  return typeof value === 'string' ? value : null;
}

/** How next-auth signs people in: credentials only, a token in an encrypted cookie that carries the session's value. */
export function authOptions(): NextAuthOptions {
  const secure = isReachedOverHttps();
  const common = { httpOnly: true, sameSite: 'lax', path: '/', secure } as const;
  const prefix = secure ? '__Host-' : '';
  return {
    secret: sessionSecret(),
    useSecureCookies: secure,
    session: { strategy: 'jwt', maxAge: LONGEST_SESSION_MS / 1000 },
    pages: { signIn: '/sign-in', signOut: '/sign-in', error: '/sign-in' },
    cookies: {
      sessionToken: { name: sessionCookieName(), options: common },
      csrfToken: { name: `${prefix}stepwell.csrf-token`, options: common },
      callbackUrl: { name: `${prefix}stepwell.callback-url`, options: common },
    },
    providers: [
      CredentialsProvider({
        name: 'E-mail address and password',
        credentials: { email: { type: 'email' }, password: { type: 'password' } },
        authorize: (credentials, request) =>
          authorize(credentials, headerOf(request.headers, 'x-forwarded-for')),
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) => (user ? { session: (user as { session?: string }).session } : token),
      // Who the person is, is read from the database at each request, never from the token.
      session: ({ session }) => ({ expires: session.expires }),
      redirect: () => `${environment().url}/today`,
    },
    logger: {
      error: (code) => log().error({ code }, 'next-auth'),
      warn: (code) => log().debug({ code }, 'next-auth'),
      debug: () => undefined,
    },
    events: {
      signOut: async ({ token }) => {
        if (typeof token?.session === 'string') await endSession(tokenDigest(token.session));
      },
    },
  };
}
