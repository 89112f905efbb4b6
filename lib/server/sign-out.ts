import 'server-only';
import { cookies } from 'next/headers';
import { redirect } from 'next/navigation';
import { tokenDigest } from '@/lib/auth/tokens';
import { endSession } from '@/lib/commands/end-session';
import { isReachedOverHttps, sessionCookieName, sessionToken } from './session-cookie';

/** Takes the session's cookie back from the browser. */
export async function forgetSessionCookie(): Promise<void> {
  (await cookies()).set(sessionCookieName(), '', {
    httpOnly: true,
    sameSite: 'lax',
    path: '/',
    secure: isReachedOverHttps(),
    maxAge: 0,
  });
}

/** Ends the session of this browser, in the database and in its cookie, and shows the sign-in page. */
export async function signOutHere(): Promise<never> {
  const token = await sessionToken();
  if (token !== null) await endSession(tokenDigest(token));
  await forgetSessionCookie();
  redirect('/sign-in?because=signed-out');
}
