import { describe, expect, it } from 'vitest';
import { nextAddress, signInSchema } from './sign-in';

describe('where to go after signing in', () => {
  it.each(['/today', '/trials/WELL-02/cohorts/4?tab=data', '/administration', '/account#sessions'])(
    '%s is kept',
    (address) => {
      expect(nextAddress(address)).toBe(address);
    },
  );

  // Open redirects, as browsers read addresses (WHATWG URL Standard: "\" counts as "/", tabs and line ends are dropped).
  it.each([
    undefined,
    null,
    42,
    ['/trials'],
    '',
    '/',
    'trials',
    'https://elsewhere.example/',
    '//elsewhere.example',
    '/\\elsewhere.example',
    '\\\\elsewhere.example',
    '/\t/elsewhere.example',
    '/\n/elsewhere.example',
    'javascript:alert(1)',
    '/trials\r\nSet-Cookie: a=b',
    '/sign-in?next=/trials',
    '/sign-in',
    '/api/auth/signout',
    '/é',
    `/${'a'.repeat(2_000)}`,
  ])('%j leads to Today', (address) => {
    expect(nextAddress(address)).toBe('/today');
  });

  it('never leads to another site', () => {
    const home = 'http://stepwell.example';
    for (const first of ['/', '\\', '\t', '.', '@', ':', '%', '?', '#', '//', '/./', '/..//']) {
      const address = nextAddress(`/${first}elsewhere.example`);
      expect(new URL(address, home).origin).toBe(home);
    }
  });
});

describe('what the sign-in form sends', () => {
  it('is an address and a password, and nothing beside', () => {
    expect(signInSchema.safeParse({ email: 'a@b.example', password: 'x' }).success).toBe(true);
    expect(signInSchema.safeParse({ email: 'a@b.example', password: 'x', admin: true }).success).toBe(false);
    expect(signInSchema.safeParse({ email: ['a@b.example'], password: { $ne: null } }).success).toBe(false);
    expect(signInSchema.safeParse({ email: 'a@b.example', password: 'x'.repeat(201) }).success).toBe(false);
  });
});
