import { z } from 'zod';
import { SHORTEST_PASSWORD } from './password-length';
import { TEXT_LIMITS } from './trial-inputs';

export const LONGEST_PASSWORD = TEXT_LIMITS.password;

/** Words every guesser tries first in this place, beside those of the person (OWASP ASVS 5.0, 6.2.11). */
const CONTEXT_WORDS = ['stepwell', 'password', 'passphrase', 'welcome', 'letmein', 'administrator', 'trial'];

/** Runs of neighbours on a keyboard, in the alphabet and among the digits. */
const RUNS = [
  'abcdefghijklmnopqrstuvwxyz',
  '01234567890',
  'qwertyuiop',
  'asdfghjkl',
  'zxcvbnm',
  'qwertzuiop',
];
const FEWEST_CHARACTERS = 5;

/** The text without the longest pieces of four or more that run along one of `RUNS`, forwards or backwards. */
function withoutRuns(text: string): string {
  const lines = RUNS.flatMap((run) => [run, [...run].reverse().join('')]);
  let rest = '';
  for (let start = 0; start < text.length;) {
    let length = 1;
    while (
      start + length < text.length &&
      lines.some((line) => line.includes(text.slice(start, start + length + 1)))
    ) {
      length += 1;
    }
    if (length < 4) rest += text.slice(start, start + length);
    start += length;
  }
  return rest;
}

/**
 * Why a password is too easy to guess, as a sentence, or null when it is not. What is left of it after the words of
 * this place and of the person, and runs of keys, must still be six characters, of at least five different in all.
 * There is no rule of composition.
 * @param personalWords address and printed name of the person
 */
export function whyGuessable(password: string, personalWords: readonly string[] = []): string | null {
  const plain = password.normalize('NFKC').toLowerCase();
  if (new Set(plain).size < FEWEST_CHARACTERS) {
    return 'This password repeats a few characters, so it is easily guessed. Use several words that do not belong together.';
  }
  if (/^(.{1,8}?)\1+$/u.test(plain)) {
    return 'This password repeats one piece, so it is easily guessed. Use several words that do not belong together.';
  }
  const words = [
    ...CONTEXT_WORDS,
    ...personalWords.flatMap((text) => text.toLowerCase().split(/[^\p{L}\p{N}]+/u)),
  ]
    .filter((word) => word.length >= 4)
    .sort((one, other) => other.length - one.length);
  let rest = plain;
  for (const word of words) rest = rest.replaceAll(word, '\n');
  rest = rest.split('\n').map(withoutRuns).join('');
  if (rest.length < 6) {
    return 'This password is made of your name, this place or a row of keys, so it is easily guessed. Use several words that do not belong together.';
  }
  return null;
}

/**
 * A password somebody chooses: 12 to 200 characters, any characters, not trimmed, not easily guessed. The words of the
 * person are refused by the command that stores it (`whyGuessable`). There is no list of passwords found in breaches.
 */
export const newPasswordSchema = z
  .string({ error: `Choose a password of at least ${SHORTEST_PASSWORD} characters.` })
  .max(LONGEST_PASSWORD, { error: `A password has at most ${LONGEST_PASSWORD} characters.`, abort: true })
  .min(SHORTEST_PASSWORD, {
    error: `A password has at least ${SHORTEST_PASSWORD} characters. Several words that do not belong together are easy to keep.`,
  })
  .superRefine((password, context) => {
    const reason = whyGuessable(password);
    if (reason !== null) context.addIssue({ code: 'custom', message: reason, input: '' });
  });
