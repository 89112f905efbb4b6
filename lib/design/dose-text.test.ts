import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { doseText } from './dose-text';
import { check } from '@/tests/properties';

const plain = { unit: 'mg', doseNotation: 'plain' } as const;
const powers = { unit: '[CFU]', doseNotation: 'powers-of-ten' } as const;

describe('doseText', () => {
  it('prints the exact decimal and the unit people read', () => {
    expect(doseText(plain, '60')).toBe('60 mg');
    expect(doseText(plain, '0.3')).toBe('0.3 mg');
    expect(doseText({ ...plain, unit: 'ug/kg' }, '12.5')).toBe('12.5 µg/kg');
    expect(doseText({ ...plain, unit: '{vials}' }, '2')).toBe('2 {vials}');
  });

  // SI Brochure, 9th edition (BIPM, 2019), 5.4: a space between number and unit, and × 10 with a raised exponent.
  it('prints powers of ten where the design asks for them', () => {
    expect(doseText(powers, '25000')).toBe('2.5 × 10⁴ CFU');
    expect(doseText(powers, '1000000000')).toBe('10⁹ CFU');
    expect(doseText(powers, '0.002')).toBe('2 × 10⁻³ CFU');
    expect(doseText(powers, '3')).toBe('3 CFU');
    expect(doseText(powers, '1')).toBe('1 CFU');
    expect(doseText(powers, '0')).toBe('0 CFU');
  });

  it('never loses a digit of the dose', () => {
    const dose = fc
      .tuple(fc.integer({ min: 1, max: 9_999_999_999 }), fc.integer({ min: 0, max: 9_999_999_999 }))
      .map(([whole, fraction]) => `${whole}.${String(fraction).padStart(10, '0')}`.replace(/\.?0+$/, ''))
      .filter((text) => Number(text) > 0);
    const significant = (text: string): string => text.replace('.', '').replace(/^0+|0+$/g, '');
    check(
      fc.property(dose, (text) => {
        const shown = doseText(powers, text)
          .replace(/(×? ?10[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+)? CFU$/, '')
          .trim();
        expect(significant(shown === '' ? '1' : shown)).toBe(significant(text));
      }),
    );
  });
});
