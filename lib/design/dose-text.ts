import { powerOfTen } from './decimal';
import type { Design } from '@/lib/schemas/design';
import { unitText } from '@/lib/schemas/units';

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** A dose with its unit as read in sentences: "60 mg", or "2 × 10⁴ CFU" where the design prints powers of ten. */
export function doseText(design: Pick<Design, 'unit' | 'doseNotation'>, dose: string): string {
  const unit = unitText(design.unit);
  const power = design.doseNotation === 'powers-of-ten' ? powerOfTen(dose) : null;
  if (power === null || power.exponent === 0) return `${dose} ${unit}`;
  const digits = [...String(power.exponent)];
  const exponent = digits.map((digit) => (digit === '-' ? '⁻' : SUPERSCRIPTS[Number(digit)])).join('');
  return power.mantissa === '1' ? `10${exponent} ${unit}` : `${power.mantissa} × 10${exponent} ${unit}`;
}
