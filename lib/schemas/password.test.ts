import { describe, expect, it } from 'vitest';
import { newPasswordSchema, whyGuessable } from './password';

const sentence = (password: unknown): string | undefined => {
  const result = newPasswordSchema.safeParse(password);
  return result.success ? undefined : result.error.issues[0]?.message;
};

describe('a password one chooses', () => {
  // OWASP ASVS 5.0: 6.2.1 (length), 6.2.5 (no rule of composition), 6.2.8 (no truncation), 6.2.9 (64 and more allowed),
  // 6.2.11 (words of the place).
  it.each([
    'quiet water below',
    'granite heron lantern',
    'aldvmqpxzrwk',
    '              x y z w v',
    'ключ от старого дома',
    '階段を下りて水へ行く道を歩く人',
    `${'stair of granite '.repeat(11)}xyz`,
    '<script>alert(1)</script>',
  ])('%j is taken as it is', (password) => {
    const result = newPasswordSchema.safeParse(password);
    expect(result.success).toBe(true);
    expect(result.data).toBe(password);
  });

  it.each([
    ['elevenchars', /at least 12/],
    ['', /at least 12/],
    ['ab'.repeat(101), /at most 200/],
    ['aaaaaaaaaaaaaa', /repeats a few/],
    ['ababababababab', /repeats a few/],
    ['stonestonestonestone', /repeats one piece/],
    ['passwordpassword', /repeats one piece/],
    ['password1234', /made of/],
    ['Password12345!', /made of/],
    ['1234567890123', /made of/],
    ['qwertyuiopasdf', /made of/],
    ['abcdefghijklmnop', /made of/],
    ['zyxwvutsrqponml', /made of/],
    ['stepwell stepwell1', /made of/],
    ['Administrator1', /made of/],
  ])('%s is refused in a sentence', (password, expected) => {
    expect(sentence(password)).toMatch(expected);
  });

  it('of five megabytes is refused without being looked through', () => {
    expect(sentence('x'.repeat(5_000_000))).toMatch(/at most 200/);
  });

  it.each([[undefined], [null], [42], [['granite heron lantern']], [{ length: 20 }]])(
    '%j is no password',
    (value) => {
      expect(sentence(value)).toMatch(/Choose a password/);
    },
  );
});

describe('words of the person', () => {
  it('do not make a password by themselves', () => {
    const words = ['ines.maartens@demo.example', 'Dr Ines Maartens'];
    expect(whyGuessable('inesmaartens12', words)).toMatch(/your name/);
    expect(whyGuessable('Maartens-demo-1', words)).toMatch(/your name/);
    expect(whyGuessable('inesmaartens12')).toBeNull();
    expect(whyGuessable('Maartens keeps nine geese', words)).toBeNull();
  });
});
