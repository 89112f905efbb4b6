import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import { LINE_LENGTH, wrap } from './wrap';

describe('wrap', () => {
  it('breaks at blanks and puts the prefixes before the lines', () => {
    expect(wrap('a b', '| ', '| ')).toBe('| a b');
    const lines = wrap('word '.repeat(30), 'Signed by   ').split('\n');
    expect(lines[0]).toMatch(/^Signed by {3}word/);
    expect(lines[1]).toMatch(/^ {12}word/);
  });

  it('holds together what a non-breaking space joins', () => {
    const text = `${'x'.repeat(LINE_LENGTH - 4)} 60\u00a0mg`;
    expect(wrap(text)).toBe(`${'x'.repeat(LINE_LENGTH - 4)}\n60 mg`);
  });

  it('leaves an address whole and cuts any other long word', () => {
    const address = `https://example.org/${'a'.repeat(100)}`;
    expect(wrap(`see ${address}`)).toBe(`see\n${address}`);
    expect(
      wrap('y'.repeat(100))
        .split('\n')
        .map((line) => line.length),
    ).toEqual([72, 28]);
  });

  it('loses no character and makes no line too long', () => {
    check(
      fc.property(fc.string({ unit: 'binary', maxLength: 400 }), (text) => {
        const wrapped = wrap(text);
        const bare = (each: string): string => each.replace(/\s+/g, '');
        expect(bare(wrapped)).toBe(bare(text));
        for (const line of wrapped.split('\n')) expect([...line].length).toBeLessThanOrEqual(LINE_LENGTH);
      }),
    );
  });
});
