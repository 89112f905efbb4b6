import { computedDigits, computedDoseDigits } from '@/lib/design/trace/format';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';

const SUPERSCRIPTS: Readonly<Record<string, string>> = Object.fromEntries(
  [...'-0123456789'].map((digit, index) => [digit, '⁻⁰¹²³⁴⁵⁶⁷⁸⁹'[index] ?? '']),
);

/** Digits with an exponent ("1.2e-7") as 1.2 × 10⁻⁷, with a typographic minus; what is no number as a dash. */
function digitsText(digits: string): string {
  const [mantissa = digits, exponent] = digits.split('e');
  const sign = (text: string) => text.replace('-', '−');
  if (exponent === undefined) return sign(mantissa);
  const raised = [...exponent.replace('+', '')].map((digit) => SUPERSCRIPTS[digit] ?? digit).join('');
  return `${sign(mantissa)} × 10${raised}`;
}

/** A computed number to three digits or decimals; "–" where it left the range of numbers. */
export function computedText(value: number): string {
  return Number.isFinite(value) ? digitsText(computedDigits(value)) : '–';
}

/** A computed dose to three digits, without its unit: no dose to release. */
export function computedDoseText(value: number, notation: Design['doseNotation'] = 'plain'): string {
  if (!Number.isFinite(value)) return '–';
  return digitsText(
    notation === 'powers-of-ten' && Math.abs(value) >= 100
      ? value.toExponential(2)
      : computedDoseDigits(value),
  );
}

/** The same with its unit. */
export function computedDoseWithUnit(value: number, design: Pick<Design, 'unit' | 'doseNotation'>): string {
  return `${computedDoseText(value, design.doseNotation)} ${unitText(design.unit)}`;
}

/** A probability to three decimals. */
export function probabilityText(value: number): string {
  return Number.isFinite(value) ? value.toFixed(3) : '–';
}
