import type { Design } from '@/lib/schemas/design';
import type { Dose } from '@/lib/schemas/dose';
import { unitText } from '@/lib/schemas/units';
import { powerOfTen } from '../decimal';
import type { TraceNumber } from './line';

/** A piece of a formula: text as it stands, raised or lowered. */
export interface Segment {
  readonly text: string;
  readonly shift?: 'sub' | 'sup';
}

/** What printing needs of a design. */
export interface PrintContext {
  /** The unit as people read it. */
  readonly unit: string;
  readonly scale: Design['scale'];
  readonly notation: Design['doseNotation'];
  readonly response: Pick<Design['response'], 'present' | 'absent'>;
}

export function printContext(
  design: Pick<Design, 'unit' | 'scale' | 'doseNotation' | 'response'>,
): PrintContext {
  return {
    unit: unitText(design.unit),
    scale: design.scale,
    notation: design.doseNotation,
    response: { present: design.response.present, absent: design.response.absent },
  };
}

const MINUS = '−';
const text = (value: string): Segment => ({ text: value });

function withMinus(digits: string): string {
  return digits.startsWith('-') ? `${MINUS}${digits.slice(1)}` : digits;
}

/** A number given as digits with an exponent ("1.2e-7") as 1.2 × 10⁻⁷; other digits as they are. */
function scientific(digits: string): Segment[] {
  const [mantissa = digits, exponent] = digits.split('e');
  if (exponent === undefined) return [text(withMinus(digits))];
  return [text(`${withMinus(mantissa)} × 10`), { text: withMinus(exponent.replace('+', '')), shift: 'sup' }];
}

/** Three decimals, or three significant digits for numbers that need them. */
export function computedDigits(value: number): string {
  const size = Math.abs(value);
  if (value === 0) return '0';
  if (size < 0.01) return Number(value.toPrecision(3)).toString();
  if (size < 1000) return value.toFixed(3);
  if (size < 1e6) return value.toFixed(1);
  return value.toExponential(3);
}

/** Three significant digits, whole above a thousand: a computed dose is no dose to release. */
export function computedDoseDigits(value: number): string {
  const size = Math.abs(value);
  if (value === 0) return '0';
  if (size >= 1e9 || size < 1e-4) return value.toExponential(2);
  return size >= 1000 ? value.toFixed(0) : value.toPrecision(3);
}

/** An exact dose without its unit: its decimal, or mantissa and power of ten where the design prints them so. */
export function doseSegments(dose: Dose, notation: Design['doseNotation']): Segment[] {
  const power = notation === 'powers-of-ten' ? powerOfTen(dose) : null;
  if (power === null || (power.exponent > -2 && power.exponent < 2)) return [text(dose)];
  const exponent: Segment = { text: withMinus(String(power.exponent)), shift: 'sup' };
  return power.mantissa === '1' ? [text('10'), exponent] : [text(`${power.mantissa} × 10`), exponent];
}

/** Digits of a number of a trace, without unit. */
export function numberSegments(number: TraceNumber, context: PrintContext): Segment[] {
  const { value, form } = number;
  if (typeof value === 'string') return doseSegments(value, context.notation);
  switch (form) {
    case 'exact':
      return scientific(String(value));
    case 'computed':
      return scientific(computedDigits(value));
    case 'signed':
      return value > 0
        ? [text('+'), ...scientific(computedDigits(value))]
        : scientific(computedDigits(value));
    case 'probability':
      return [text(value.toFixed(3))];
    case 'posterior':
      return [text(value.toFixed(4))];
    case 'dose':
    case 'dose-computed':
      return scientific(
        context.notation === 'powers-of-ten' && value >= 100
          ? value.toExponential(2)
          : computedDoseDigits(value),
      );
  }
}

/** Segments as plain text: lowered pieces after "_", raised ones after "^". */
export function segmentsText(segments: readonly Segment[]): string {
  return segments
    .map(({ text: piece, shift }) => (shift === 'sub' ? `_${piece}` : shift === 'sup' ? `^${piece}` : piece))
    .join('');
}
