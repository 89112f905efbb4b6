import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import { readNumber, textOfNumber } from './number-text';

describe('reading a number as it was typed', () => {
  it.each([
    ['0.25', 0.25],
    [' 12 ', 12],
    ['-3.5', -3.5],
    ['\u22123.5', -3.5],
    ['+4', 4],
    ['.5', 0.5],
    ['5.', 5],
    ['1e-3', 0.001],
    ['-0', 0],
    ['007', 7],
  ])('reads %j', (text, value) => {
    expect(readNumber(text)).toEqual({ ok: true, value });
  });

  it.each([
    ['1,5', 'Write a point, not a comma: 1.5 instead of 1,5.'],
    ['1 000', 'Write the number without spaces, commas or other marks between its digits.'],
    ['1,000,000', 'Write the number without spaces, commas or other marks between its digits.'],
    ['60 mg', 'Write the number alone: 60 without “mg”.'],
    ['12abc', 'Write the number alone: 12 without “abc”.'],
    ['abc', 'This is not a number. Write digits, with a point for decimals, such as 1.5.'],
    ['NaN', 'This is not a number. Write digits, with a point for decimals, such as 1.5.'],
    ['Infinity', 'This is not a number. Write digits, with a point for decimals, such as 1.5.'],
    ['0x10', 'Write the number alone: 0 without “x10”.'],
    ['1e309', 'This number is too large to be kept.'],
    ['1e-400', 'This number is too small to be kept.'],
    ['0.1234567890123456', 'Write at most 15 significant digits; more cannot be kept exactly.'],
  ])('refuses %j with a sentence', (text, sentence) => {
    expect(readNumber(text)).toEqual({ ok: false, sentence });
  });

  // IEEE 754: a decimal of at most 15 significant digits survives the way to a double and back.
  it('gives back every decimal of at most 15 significant digits', () => {
    const decimal = fc
      .tuple(fc.integer({ min: 1, max: 999_999_999_999_999 }), fc.integer({ min: 0, max: 14 }))
      .map(([digits, places]) => {
        const text = String(digits).padStart(places + 1, '0');
        return places === 0 ? text : `${text.slice(0, -places)}.${text.slice(-places)}`;
      });
    check(
      fc.property(decimal, (text) => {
        const reading = readNumber(text);
        expect(reading.ok).toBe(true);
        if (!reading.ok) return;
        const places = text.split('.')[1]?.length ?? 0;
        expect(reading.value.toFixed(places)).toBe(text);
      }),
    );
  });

  it('never throws and never guesses: whatever is read is what Number reads', () => {
    check(
      fc.property(fc.string(), (text) => {
        const reading = readNumber(text);
        if (reading.ok) expect(reading.value).toBe(Number(text.trim().replace(/^\u2212/, '-')) + 0);
        else expect(reading.sentence).toMatch(/\.$/);
      }),
    );
  });
});

describe('putting a number back into its field', () => {
  it('shows numbers, keeps texts, and shows nothing for what is neither', () => {
    expect([textOfNumber(0.25), textOfNumber('1,5'), textOfNumber(undefined), textOfNumber(NaN)]).toEqual([
      '0.25',
      '1,5',
      '',
      '',
    ]);
  });
});
