import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { check } from '@/tests/properties';
import {
  addDecimals,
  canonicalDecimal,
  compareDecimals,
  equalDecimals,
  formatDecimal,
  multiplyDecimal,
  powerOfTen,
  subtractDecimals,
} from './decimal';
import { exactGrid, gridDecimal, gridIndex, gridValue } from './dose-grid';

describe('decimals', () => {
  it('adds 0.1 and 0.2 to 0.3', () => {
    expect(addDecimals('0.1', '0.2')).toBe('0.3');
    expect(subtractDecimals('0.3', '0.1')).toBe('0.2');
    expect(multiplyDecimal('0.1', 3)).toBe('0.3');
    expect(equalDecimals('1.0', '1')).toBe(true);
    expect(canonicalDecimal('10.500')).toBe('10.5');
  });

  it('tells apart decimals that are the same double', () => {
    const [a, b] = ['1234567890.0000000001', '1234567890.0000000002'];
    expect(Number(a)).toBe(Number(b));
    expect(compareDecimals(a, b)).toBe(-1);
  });

  it('multiplies by integers only', () => {
    expect(() => multiplyDecimal('1', 0.5)).toThrow(RangeError);
  });

  it('prints to a number of places and as a power of ten', () => {
    expect(formatDecimal('5', 2)).toBe('5.00');
    expect(formatDecimal('5.25', 1)).toBe('5.25');
    expect(powerOfTen('25000')).toEqual({ mantissa: '2.5', exponent: 4 });
    expect(powerOfTen('0.001')).toEqual({ mantissa: '1', exponent: -3 });
    expect(powerOfTen('0')).toBeNull();
  });
});

describe('the grid', () => {
  it('holds exact decimals: 0.1, 0.2, 0.3', () => {
    const grid = exactGrid('0.1', '1', '0.1');
    if (typeof grid === 'string') throw new Error(grid);
    expect(grid.count).toBe(10);
    expect([0, 1, 2, 9].map((i) => gridDecimal(grid, i))).toEqual(['0.1', '0.2', '0.3', '1']);
    expect(gridValue(grid, 2)).toBe(0.3);
    expect(gridIndex(grid, '0.3')).toBe(2);
    expect(gridIndex(grid, '0.35')).toBe(-1);
    expect(gridIndex(grid, '1.1')).toBe(-1);
  });

  it('ends at the last dose not above the highest', () => {
    const grid = exactGrid('1', '10', '4');
    if (typeof grid === 'string') throw new Error(grid);
    expect(grid.count).toBe(3);
    expect(gridDecimal(grid, 2)).toBe('9');
  });

  it('says why there is none', () => {
    expect(exactGrid('1', '2', '0')).toBe('increment');
    expect(exactGrid('2', '2', '1')).toBe('order');
    expect(exactGrid('1000000000', '1000000001', '0.0000000001')).toBe('digits');
  });

  it('agrees with exact decimal arithmetic everywhere', () => {
    const decimal = (max: number) =>
      fc
        .tuple(fc.integer({ min: 0, max }), fc.integer({ min: 0, max: 4 }))
        .map(([n, places]) => canonicalDecimal((n / 10 ** places).toFixed(places)));
    check(
      fc.property(decimal(1e6), decimal(1e4), fc.integer({ min: 0, max: 500 }), (lowest, increment, i) => {
        const highest = addDecimals(lowest, multiplyDecimal(increment === '0' ? '1' : increment, 501));
        const grid = exactGrid(lowest, highest, increment === '0' ? '1' : increment);
        if (typeof grid === 'string') throw new Error(grid);
        const expected = addDecimals(lowest, multiplyDecimal(increment === '0' ? '1' : increment, i));
        expect(gridDecimal(grid, i)).toBe(expected);
        expect(gridValue(grid, i)).toBe(Number(expected));
        expect(gridIndex(grid, expected)).toBe(i);
      }),
    );
  });
});
