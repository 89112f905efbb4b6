import 'server-only';
import { cookies } from 'next/headers';
import { decode } from 'next-auth/jwt';
import { z } from 'zod';
import { environment } from '@/lib/env';

/** Whether people reach this installation over https: the cookie is then sent over nothing else. */
export function isReachedOverHttps(): boolean {
  return environment().url.startsWith('https://');
}

/** The name of the session's cookie. The prefix makes browsers insist on https, this host and no other path. */
export function sessionCookieName(): string {
  return `${isReachedOverHttps() ? '__Host-' : ''}stepwell.session-token`;
}

/** The secret that encrypts the cookie; an installation without one serves nobody. */
export function sessionSecret(): string {
  const secret = environment().nextAuthSecret;
  if (secret === undefined) throw new Error('NEXTAUTH_SECRET is missing.');
  return secret;
}

/** What the cookie holds, beside the times of the token: the session's secret value. */
const cookieContent = z.object({ session: z.string().min(40).max(100) });

/** The secret value of the session this request carries, or null: no cookie, a forged or an old one. */
export async function sessionToken(): Promise<string | null> {
  const value = (await cookies()).get(sessionCookieName())?.value;
  if (value === undefined) return null;
  return tokenInCookie(value);
}

async function tokenInCookie(value: string): Promise<string | null> {
  try {
    const content = cookieContent.safeParse(await decode({ token: value, secret: sessionSecret() }));
    return content.success ? content.data.session : null;
  } catch {
    // What does not decrypt, or has run out, is no session; whoever sent it signs in.
    return null;
  }
}
