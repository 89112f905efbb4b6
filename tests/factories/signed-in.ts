import { randomUUID } from 'node:crypto';
import { encode } from 'next-auth/jwt';
import { vi } from 'vitest';
import { startSession } from '@/lib/commands/start-session';
import { models } from '@/lib/db/connection';

const SECRET = 'a secret of this test run, long enough: 7f3k29';

/** The cookies and headers of the request that is acted: a test sets them, `next/headers` hands them out. */
export const requestAtHand = { cookies: new Map<string, string>(), headers: new Headers() };

/** What stands for `next/headers`: `vi.mock('next/headers', nextHeaders)`. */
export const nextHeaders = () => ({
  cookies: async () => ({
    get: (name: string) => {
      const value = requestAtHand.cookies.get(name);
      return value === undefined ? undefined : { name, value };
    },
    getAll: () => [...requestAtHand.cookies].map(([name, value]) => ({ name, value })),
    set: (name: string, value: string) => requestAtHand.cookies.set(name, value),
  }),
  headers: async () => requestAtHand.headers,
});

/** Sets the environment of a web server; before the first use of `environment()`. */
export function asWebServer(): void {
  vi.stubEnv('NEXTAUTH_SECRET', SECRET);
  vi.stubEnv('STEPWELL_URL', 'http://stepwell.example');
}

/** Makes the next requests those of a visitor. */
export function signedOut(): void {
  requestAtHand.cookies.clear();
  requestAtHand.headers = new Headers();
}

/** Makes the next requests those of a person with a new session; returns the session's secret value. */
export async function signedInAs(personId: string, clientAddress = '192.0.2.1'): Promise<string> {
  const person = await models().Person.findByPk(personId, { rejectOnEmpty: true });
  const token = await startSession({ personId, passwordHash: person.passwordHash ?? '' });
  await withSession(token);
  requestAtHand.headers = new Headers({ 'x-forwarded-for': clientAddress });
  return token;
}

/** Makes the next requests carry a session's cookie, as next-auth writes it. */
export async function withSession(token: string, secret = SECRET): Promise<void> {
  const value = await encode({ token: { session: token }, secret, maxAge: 3_600 });
  requestAtHand.cookies.set('stepwell.session-token', value);
}

/** An input as a form sends it: with a submission key of its own. */
export function submission<Input extends object>(input: Input): Input & { submissionKey: string } {
  return { ...input, submissionKey: randomUUID() };
}
