import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import { doseSchema } from './dose';

const problem = (input: unknown) => doseSchema.safeParse(input).error?.issues[0]?.message;

describe('doseSchema', () => {
  it.each([
    ['0', '0'],
    ['0.30', '0.3'],
    ['007', '7'],
    ['10.000', '10'],
    [' 12.5 ', '12.5'],
    ['1234567890.0123456789', '1234567890.0123456789'],
    ['0.0000000001', '0.0000000001'],
    ['5000000000', '5000000000'],
  ])('reads %s as %s', (typed, canonical) => {
    expect(doseSchema.parse(typed)).toBe(canonical);
  });

  it.each([
    ['', /missing/],
    ['   ', /missing/],
    ['NaN', /not a decimal number/],
    ['Infinity', /not a decimal number/],
    ['1e309', /without an exponent/],
    ['1e5', /without an exponent/],
    ['-1', /without a sign/],
    ['+1', /without a sign/],
    ['0,5', /decimal mark is a point/],
    ['1.', /not a decimal number/],
    ['.5', /not a decimal number/],
    ['1 000', /not a decimal number/],
    ['1\u0000', /not a decimal number/],
    ['\n5', /not a decimal number/],
    ['\u202e5', /not a decimal number/],
    ['５', /not a decimal number/],
    ['0x10', /not a decimal number/],
    ['12345678901', /10 digits before/],
    ['0.00000000001', /10 digits after/],
    ['9'.repeat(5_000_000), /5000000 characters/],
  ])('refuses %.20s', (typed, message) => {
    expect(problem(typed)).toMatch(message);
  });

  it('refuses numbers, which cannot carry a decimal exactly, and absence', () => {
    for (const input of [0.3, NaN, Infinity, null, {}, ['1']]) expect(problem(input)).toMatch(/as text/);
    expect(problem(undefined)).toMatch(/missing/);
  });

  it('reads its own canonical text as itself', () => {
    const digits = fc.tuple(fc.bigInt(0n, 9_999_999_999n), fc.bigInt(0n, 9_999_999_999n));
    check(
      fc.property(digits, ([whole, fraction]) => {
        const once = doseSchema.parse(`${whole}.${String(fraction).padStart(10, '0')}`);
        expect(doseSchema.parse(once)).toBe(once);
        expect(once).not.toMatch(/^0\d|\.$|\.\d*0$/);
      }),
    );
  });
});
