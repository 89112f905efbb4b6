import { createRequire } from 'node:module';
import { NextRequest } from 'next/server';
import { beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { models } from '@/lib/db/connection';
import { nextAuthRoute } from '@/lib/server/next-auth-route';
import { peekReader } from '@/lib/server/session';
import { makeActive, makeFirstAdministrator, TEST_PASSWORD } from '../factories/installation';
import { asWebServer, nextHeaders, requestAtHand, signedOut } from '../factories/signed-in';
import { createTestDatabase } from '../setup/database';

vi.mock('next/headers', async () => (await import('../factories/signed-in')).nextHeaders());

// next-auth asks for the module by `require`, past the mock above.
Object.assign(createRequire(import.meta.url)('next/headers') as object, nextHeaders());

let person: { personId: string; email: string };
beforeAll(async () => {
  asWebServer();
  await createTestDatabase();
  person = await makeActive(await makeFirstAdministrator());
});
beforeEach(signedOut);

const BASE = 'http://stepwell.example/api/auth/';

/** Asks next-auth's route with the cookies of the request at hand, and keeps the cookies it sets. */
async function ask(
  path: string,
  options: { method?: string; headers?: Record<string, string>; body?: string } = {},
) {
  const cookie = [...requestAtHand.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  const request = new NextRequest(BASE + path, { ...options, headers: { ...options.headers, cookie } });
  const nextauth = new URL(BASE + path).pathname.replace('/api/auth/', '').split('/');
  const response = await nextAuthRoute(request, { params: Promise.resolve({ nextauth }) });
  for (const line of response.headers.getSetCookie()) {
    const [pair = ''] = line.split(';');
    const at = pair.indexOf('=');
    if (/Max-Age=0/.test(line)) requestAtHand.cookies.delete(pair.slice(0, at));
    else requestAtHand.cookies.set(pair.slice(0, at), decodeURIComponent(pair.slice(at + 1)));
  }
  return response;
}

async function signIn(email: string, password: string) {
  const { csrfToken } = (await (await ask('csrf')).json()) as { csrfToken: string };
  return ask('callback/credentials', {
    method: 'POST',
    headers: { 'content-type': 'application/x-www-form-urlencoded' },
    body: new URLSearchParams({ csrfToken, email, password, json: 'true' }).toString(),
  });
}

describe('signing in through next-auth', () => {
  it('gives a cookie by which the person is found, and which holds nothing about them', async () => {
    const response = await signIn(person.email, TEST_PASSWORD);
    expect(response.status).toBe(200);
    const cookie = response.headers.getSetCookie().find((line) => line.startsWith('stepwell.session-token='));
    expect(cookie).toMatch(/; HttpOnly/);
    expect(cookie).toMatch(/; SameSite=Lax/);
    expect(cookie).toMatch(/; Path=\//);
    expect(cookie).not.toContain(person.email);
    expect(await peekReader()).toMatchObject({ personId: person.personId });
    const session = await ask('session');
    expect(Object.keys((await session.json()) as object)).toEqual(['expires']);
  });

  it('is refused with the sentence to show, and with no cookie', async () => {
    const response = await signIn(person.email, 'not the password');
    expect(response.status).toBe(401);
    const { url } = (await response.json()) as { url: string };
    expect(new URL(url).searchParams.get('error')).toMatch(/not right/);
    expect(requestAtHand.cookies.has('stepwell.session-token')).toBe(false);
  });

  it('is refused without the token against forgery', async () => {
    await signIn(person.email, 'not the password');
    const before = await models().SignInAttempt.count();
    await ask('callback/credentials', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded' },
      body: new URLSearchParams({
        csrfToken: 'forged',
        email: person.email,
        password: TEST_PASSWORD,
      }).toString(),
    });
    expect(requestAtHand.cookies.has('stepwell.session-token')).toBe(false);
    expect(await models().SignInAttempt.count()).toBe(before);
  });

  it('ends with signing out: the row is ended, so a copied cookie is worth nothing', async () => {
    await signIn(person.email, TEST_PASSWORD);
    const copied = new Map(requestAtHand.cookies);
    const { csrfToken } = (await (await ask('csrf')).json()) as { csrfToken: string };
    await ask('signout', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded' },
      body: new URLSearchParams({ csrfToken, json: 'true' }).toString(),
    });
    requestAtHand.cookies.clear();
    for (const [name, value] of copied) requestAtHand.cookies.set(name, value);
    expect(await peekReader()).toBeNull();
  });
});

describe('bad input', () => {
  const json = { method: 'POST', headers: { 'content-type': 'application/json' } };
  it.each<[string, string, Parameters<typeof ask>[1], number]>([
    ['a body that is no JSON', 'callback/credentials', { ...json, body: '{' }, 422],
    ['a body that is a text', 'callback/credentials', { ...json, body: '"text"' }, 422],
    ['a body of no form', 'callback/credentials', { method: 'POST', body: 'x' }, 422],
    ['a callback address that is none', 'csrf?callbackUrl=%00', {}, 422],
    ['a callback that is a script', 'csrf?callbackUrl=javascript:alert(1)', {}, 422],
    ['an act it does not have', 'register', {}, 404],
    ['a page of its own', 'verify-request', {}, 404],
    ['a log of the client', '_log', { method: 'POST', body: '{}' }, 404],
  ])('%s is refused in words', async (_name, path, options, status) => {
    const response = await ask(path, options);
    expect(response.status).toBe(status);
    expect(await response.json()).toMatchObject({ status, code: status === 404 ? 'not-found' : 'invalid' });
  });

  it('in the callback cookie costs one attempt: the cookie is taken back', async () => {
    requestAtHand.cookies.set('stepwell.callback-url', 'garbage');
    expect((await ask('csrf')).status).toBe(422);
    expect((await ask('csrf')).status).toBe(200);
  });

  it('in the other cookies is no session', async () => {
    requestAtHand.cookies.set('stepwell.session-token', 'eyJhbGciOiJkaXIifQ..a.b.c');
    requestAtHand.cookies.set('stepwell.csrf-token', 'garbage');
    expect((await ask('csrf')).status).toBe(200);
    expect(await (await ask('session')).json()).toEqual({});
    expect(await peekReader()).toBeNull();
  });
});
