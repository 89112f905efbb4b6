import { describe, expect, it } from 'vitest';
import { emailSchema, normaliseEmail } from './email';

describe('an e-mail address', () => {
  it.each([
    [' Lena.Okoro@Demo.Example ', 'lena.okoro@demo.example'],
    ["o'neil+trial@sub.example.org", "o'neil+trial@sub.example.org"],
  ])('%j comes out as %j', (typed, stored) => {
    expect(emailSchema.parse(typed)).toBe(stored);
  });

  it.each([
    '',
    '   ',
    'lena',
    'lena@',
    '@demo.example',
    'a b@demo.example',
    'lena@demo.example\r\nBcc: all@demo.example',
    'lena@demo.example\u202e',
    `${'a'.repeat(250)}@demo.example`,
    'x'.repeat(5_000_000),
    null,
    { email: 'lena@demo.example' },
  ])('%.40j is refused', (typed) => {
    expect(emailSchema.safeParse(typed).success).toBe(false);
  });

  it('is compared in the composed form, in lower case', () => {
    expect(normaliseEmail('JOSE\u0301@demo.example')).toBe('jos\u00e9@demo.example');
    expect(normaliseEmail('jose@demo.example')).not.toBe(normaliseEmail('josé@demo.example'));
  });
});
