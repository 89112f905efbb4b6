import { powerOfTen } from './decimal';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** A dose without its unit, as the design prints it: "60", or "2 × 10⁴" where it prints powers of ten. */
export function doseNumber(notation: Design['doseNotation'], dose: string): string {
  const power = notation === 'powers-of-ten' ? powerOfTen(dose) : null;
  if (power === null || power.exponent === 0) return dose;
  const digits = [...String(power.exponent)];
  const exponent = digits.map((digit) => (digit === '-' ? '⁻' : SUPERSCRIPTS[Number(digit)])).join('');
  return power.mantissa === '1' ? `10${exponent}` : `${power.mantissa} × 10${exponent}`;
}

/** A dose with its unit as read in sentences: "60 mg", or "2 × 10⁴ CFU" where the design prints powers of ten. */
export function doseText(design: Pick<Design, 'unit' | 'doseNotation'>, dose: string): string {
  return `${doseNumber(design.doseNotation, dose)} ${unitText(design.unit)}`;
}
